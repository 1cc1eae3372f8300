import { useState } from "react";
import type { Brief } from "#shared/schemas/brief";
import type { FitsResponse, Objective, Relaxation } from "#shared/schemas/fits";
import { formatCount } from "#shared/values/engineering";
import { problemOf } from "../../lib/api";
import { Button } from "../../ui/button";
import type { DataTableSort } from "../../ui/data-table-model";
import { Dialog } from "../../ui/dialog";
import { EmptyState } from "../../ui/empty-state";
import { ProblemMessage } from "../../ui/problem-message";
import { Progress } from "../../ui/progress";
import { FitsTable } from "./fits-table";
import { ObjectiveChoice } from "./objective-choice";
import type { RankingProgress, RankingState } from "./use-ranking";

type RankingViewProps = {
  brief: Brief;
  briefId: number | null;
  ranking: RankingState;
  objective: Objective;
  onObjectiveChange: (objective: Objective) => void;
  sort: DataTableSort | null;
  onSortChange: (sort: DataTableSort | null) => void;
  /** The form says something else than what was ranked. */
  isStale: boolean;
  onRelax: (relax: Relaxation) => void;
};

/** What came of ranking a brief: how far it is, the fits, or what stands in the way. */
export function RankingView(props: RankingViewProps) {
  const { brief, briefId, ranking, objective, sort, onSortChange, isStale, onRelax } = props;
  const { result, provisional, error, isRanking, progress, cancelled, rank, cancel } = ranking;
  const shown = result?.fits ?? provisional ?? [];
  return (
    <section aria-label="Ranking">
      <div className="flex flex-wrap items-baseline justify-between gap-x-8 gap-y-2 pb-3">
        {result && (
          <p>
            <Summary result={result} />
          </p>
        )}
        <ObjectiveChoice brief={brief} objective={objective} onChange={props.onObjectiveChange} />
        {isStale && (
          <p className="text-caution-ink text-sm">The brief has changed since: rank the fits again.</p>
        )}
      </div>
      {isRanking && !result && (
        <div className="pb-4">
          <Progress
            fraction={progress && progress.partsDone / progress.partsTotal}
            label={progressWords(progress)}
            action={
              <Button size="small" onClick={cancel}>
                Cancel
              </Button>
            }
          />
          {shown.length > 0 && (
            <p className="pt-2 text-quiet text-sm">Provisional, still ranking: these rows may change.</p>
          )}
        </div>
      )}
      {error ? (
        <ProblemMessage problem={problemOf(error)} onRetry={rank} retrying={isRanking} />
      ) : cancelled && !result ? (
        <EmptyState title="Ranking was cancelled." action={<Button onClick={rank}>Rank again</Button>}>
          Nothing was kept of it.
        </EmptyState>
      ) : result?.fits.length === 0 ? (
        <NothingFits result={result} onRelax={onRelax} />
      ) : (
        shown.length > 0 && (
          <FitsTable
            fits={shown}
            isProvisional={!result}
            brief={brief}
            briefId={briefId}
            objective={objective}
            sort={sort}
            onSortChange={onSortChange}
          />
        )
      )}
    </section>
  );
}

function progressWords(progress: RankingProgress | null): string {
  if (!progress) return "Ranking";
  return `Ranking: ${formatCount(progress.partsDone)} of ${formatCount(progress.partsTotal)} parts`;
}

function Summary({ result }: { result: FitsResponse }) {
  const passedOver = result.passedOver.reduce((sum, { parts }) => sum + parts, 0);
  return (
    <>
      <strong className="tabular">{formatCount(result.considered)}</strong>{" "}
      {result.complete ? "combinations ranked in " : "combinations, not all ranked within "}
      <strong className="value text-[0.94em]">{(result.elapsedMs / 1000).toFixed(2)} s</strong>.{" "}
      {formatCount(result.partsThatFit)} {result.partsThatFit === 1 ? "part fits" : "parts fit"}
      {passedOver > 0 && (
        <>
          ; <PassedOver result={result} count={passedOver} />
        </>
      )}
      .{!result.complete && " Better fits may remain: narrow the brief and rank again."}
    </>
  );
}

function PassedOver({ result, count }: { result: FitsResponse; count: number }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button
        type="button"
        onClick={() => setOpen(true)}
        className="underline underline-offset-3 hover:decoration-2"
      >
        {formatCount(count)} passed over, and why
      </button>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Parts passed over"
        description="Each part once, by the furthest condition that any of its combinations reached."
      >
        <ReasonList result={result} />
      </Dialog>
    </>
  );
}

function ReasonList({ result }: { result: FitsResponse }) {
  return (
    <ul className="border-ink border-t">
      {result.passedOver.map(({ reason, parts, message }) => (
        <li key={reason} className="flex items-baseline justify-between gap-6 border-rule border-b py-2">
          <span>{message}</span>
          <span className="value text-sm">
            {formatCount(parts)} {parts === 1 ? "part" : "parts"}
          </span>
        </li>
      ))}
    </ul>
  );
}

function NothingFits({ result, onRelax }: { result: FitsResponse; onRelax: (relax: Relaxation) => void }) {
  const { relax } = result;
  const apply = relax && (
    <Button variant="plain" onClick={() => onRelax(relax)}>
      Relax it and rank again
    </Button>
  );
  return (
    <>
      <EmptyState title="Nothing fits this brief." action={apply}>
        {relax
          ? relax.message
          : "No single condition stands in the way: more than one has to give. The list says what stopped each part."}
      </EmptyState>
      <h2 className="mt-8 mb-2 font-medium text-sm">What stopped the parts</h2>
      <ReasonList result={result} />
    </>
  );
}
