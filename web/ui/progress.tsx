import { Progress as RadixProgress } from "radix-ui";
import type { ReactNode } from "react";

type ProgressProps = {
  /** 0 to 1; null where the end isn't known. */
  fraction: number | null;
  /** What is going on, with its figures: "120 of 2,000 parts". */
  label: string;
  /** A cancel button, at the right. */
  action?: ReactNode;
};

/** A thin bar with words: how far long work has come, and the way out. */
export function Progress({ fraction, label, action }: ProgressProps) {
  const percent = fraction === null ? null : Math.round(Math.min(1, Math.max(0, fraction)) * 100);
  return (
    <div className="flex flex-col gap-2">
      <div className="flex items-baseline justify-between gap-4">
        <span className="tabular text-quiet" role="status">
          {label}
        </span>
        {action}
      </div>
      <RadixProgress.Root
        value={percent}
        aria-label={label}
        className="relative h-[3px] w-full overflow-hidden rounded-full bg-rule"
      >
        <RadixProgress.Indicator
          className={
            percent === null
              ? "h-full w-1/3 animate-pulse bg-cutoff"
              : "h-full bg-ink transition-[width] duration-150"
          }
          style={percent === null ? undefined : { width: `${percent}%` }}
        />
      </RadixProgress.Root>
    </div>
  );
}
