import type { ReactNode } from "react";

/** A ruled list of what is so: the name at the left, the figure at the right. Holds `Fact`s. */
export function Facts({ children }: { children: ReactNode }) {
  return <dl>{children}</dl>;
}

type FactProps = {
  label: ReactNode;
  /** A quiet line under the label. */
  note?: ReactNode;
  children: ReactNode;
};

/** One line of `Facts`. */
export function Fact({ label, note, children }: FactProps) {
  return (
    <div className="flex items-baseline justify-between gap-4 border-rule border-b py-1.5">
      <dt className="text-quiet">
        {label}
        {note && <span className="block text-xs">{note}</span>}
      </dt>
      <dd className="value text-right text-sm">{children}</dd>
    </div>
  );
}
