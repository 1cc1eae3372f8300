import type { ReactNode } from "react";
import { classNames } from "./class-names";

type PageTitleProps = {
  children: ReactNode;
  /** A quiet line after the title: version, maker, origin. */
  aside?: ReactNode;
  /** Links and buttons at the right end of the line. */
  actions?: ReactNode;
  /** `small` where a sentence or a figure is the real opening of the page. */
  size?: "regular" | "small";
};

/** The page's one `h1`, with what belongs on its line. */
export function PageTitle({ children, aside, actions, size = "regular" }: PageTitleProps) {
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2">
      <div className="flex min-w-0 flex-wrap items-baseline gap-x-3.5 gap-y-1">
        <h1
          className={classNames("font-semibold", size === "small" ? "text-base" : "text-xl tracking-tight")}
        >
          {children}
        </h1>
        {aside && <div className="text-quiet text-sm">{aside}</div>}
      </div>
      {actions && (
        <div data-no-print="" className="flex flex-wrap items-center gap-x-3.5 gap-y-2">
          {actions}
        </div>
      )}
    </div>
  );
}
