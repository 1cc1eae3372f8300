import type { Problem } from "#shared/schemas/problem";
import { Button } from "./button";
import { Icon } from "./icon";

type ProblemMessageProps = {
  problem: Pick<Problem, "title" | "detail" | "requestId"> & { errors?: Problem["errors"] };
  onRetry?: () => void;
  /** The retry is under way. */
  retrying?: boolean;
};

/** What went wrong in words, with the request's number to quote and a way to try again. */
export function ProblemMessage({ problem, onRetry, retrying = false }: ProblemMessageProps) {
  const { title, detail, requestId, errors = [] } = problem;
  return (
    <div role="alert" className="border-caution border-l-3 bg-panel px-4 py-3">
      <p className="flex items-baseline gap-2 font-semibold">
        <Icon name="caution" className="relative top-0.5 text-caution" />
        {title}
      </p>
      {detail && <p className="mt-0.5 max-w-prose">{detail}</p>}
      {errors.length > 0 && (
        <ul className="mt-1 list-disc pl-5 text-sm">
          {errors.map((error) => (
            <li key={`${error.path} ${error.message}`}>{error.message}</li>
          ))}
        </ul>
      )}
      {(onRetry || requestId) && (
        <div className="mt-2.5 flex flex-wrap items-center gap-x-4 gap-y-1">
          {onRetry && (
            <Button size="small" busy={retrying} onClick={onRetry}>
              Try again
            </Button>
          )}
          {requestId && (
            <span className="text-quiet text-xs">
              Request <span className="value">{requestId}</span>
            </span>
          )}
        </div>
      )}
    </div>
  );
}
