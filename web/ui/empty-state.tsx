import type { ReactNode } from "react";

type EmptyStateProps = {
  /** What goes here, as a plain sentence. */
  title: ReactNode;
  /** Why it is empty or what it will show. */
  children?: ReactNode;
  /** The first step, usually one button or link. */
  action?: ReactNode;
};

/** An empty page or list: says what goes there and offers the first step. */
export function EmptyState({ title, children, action }: EmptyStateProps) {
  return (
    <div className="border-rule border-y py-10">
      <p className="font-semibold text-lg">{title}</p>
      {children && <div className="mt-1.5 max-w-prose text-quiet">{children}</div>}
      {action && <div className="mt-5 flex flex-wrap items-center gap-4">{action}</div>}
    </div>
  );
}
