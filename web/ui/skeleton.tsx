import { classNames } from "./class-names";

/** A pale bar where a line of text will be. Give it a width by class. */
export function Skeleton({ className }: { className?: string }) {
  return <span className={classNames("block h-4 animate-pulse rounded-sm bg-rule/60", className)} />;
}

type SkeletonRowsProps = {
  rows?: number;
  /** What is being fetched, for a screen reader. */
  label: string;
};

/** Ruled lines with pale bars while a list is fetched. */
export function SkeletonRows({ rows = 6, label }: SkeletonRowsProps) {
  return (
    <div role="status" aria-label={label} className="border-ink border-t">
      {Array.from({ length: rows }, (_, row) => row).map((row) => (
        <div key={row} className="flex items-center justify-between gap-8 border-rule border-b py-4">
          <Skeleton className={row % 2 ? "w-40" : "w-52"} />
          <Skeleton className="w-24" />
        </div>
      ))}
    </div>
  );
}
