import { type ReactNode, useEffect, useId, useState } from "react";
import { useWatch } from "react-hook-form";
import { useSearchParams } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import { OBJECTIVES, type Objective } from "#shared/schemas/fits";
import { Schematic } from "../../figures/schematics/schematic";
import { problemOf } from "../../lib/api";
import { isSameBrief, writeBriefParameter } from "../../lib/brief-link";
import { conditionsInWords } from "../../lib/brief-words";
import { applyProblem } from "../../lib/form-problem";
import { Button } from "../../ui/button";
import type { DataTableSort } from "../../ui/data-table-model";
import { FieldError } from "../../ui/field";
import { MoreConditions } from "./more-conditions";
import { RankingView } from "./ranking-view";
import { relaxBrief } from "./relax-brief";
import { Sentence } from "./sentence";
import { useBriefForm } from "./use-brief-form";
import { useRanking } from "./use-ranking";

type BriefWorkbenchProps = {
  /** What the form starts from. */
  brief: Brief;
  /** What is ranked, from the address or the saved brief; null for nothing yet. */
  ranked: Brief | null;
  briefId: number | null;
  /** The title line, given what stands in the form and whether that may be saved. */
  title: (form: { brief: Brief; isValid: boolean; validate: () => Promise<Brief | null> }) => ReactNode;
};

/** The brief as a sentence, and under it its ranked fits. */
export function BriefWorkbench({ brief, ranked, briefId, title }: BriefWorkbenchProps) {
  const { form, onUnreadable, chooseCircuit, isUnreadable, complaints } = useBriefForm(brief);
  const current = useWatch({ control: form.control }) as Brief;
  const [search, setSearch] = useSearchParams();
  const [open, setOpen] = useState(false);
  const objective = readObjective(search.get("by"));
  const ranking = useRanking(ranked, objective);
  useEffect(() => {
    if (ranking.error) applyProblem(form, problemOf(ranking.error), "brief.");
  }, [form, ranking.error]);
  const errorId = useId();
  const conditionsId = useId();

  const rank = (next: Brief) => {
    if (ranked && isSameBrief(next, ranked)) return ranking.rank();
    setSearch((params) => {
      params.set("b", writeBriefParameter(next) || "{}");
      // Another circuit has other columns.
      if (next.circuit !== ranked?.circuit) params.delete("sort");
      return params;
    });
  };
  const submit = form.handleSubmit((valid) => {
    if (!isUnreadable) rank(valid);
  });
  const validate = () =>
    new Promise<Brief | null>((resolve) => {
      void form.handleSubmit(
        (valid) => resolve(isUnreadable ? null : valid),
        () => resolve(null),
      )();
    });

  return (
    <>
      {title({ brief: current, isValid: complaints.length === 0, validate })}
      <form onSubmit={submit} noValidate className="mt-4">
        <div className="grid gap-x-8 gap-y-4 lg:grid-cols-[minmax(0,1fr)_auto]">
          <div className="min-w-0">
            <Sentence form={form} errorId={errorId} onUnreadable={onUnreadable} onCircuit={chooseCircuit} />
            <div id={errorId} className="mt-2 flex flex-col gap-1 empty:hidden">
              {complaints.map(({ path, name, message }) => (
                <FieldError key={path}>
                  {name}: {message}
                </FieldError>
              ))}
            </div>
            <div data-no-print="" className="mt-4 flex flex-wrap items-center gap-x-5 gap-y-2 text-quiet">
              <Button variant="main" type="submit" busy={ranking.isRanking}>
                Rank the fits
              </Button>
              {conditionsInWords(current).map((words) => (
                <span key={words}>{words}</span>
              ))}
              <button
                type="button"
                aria-expanded={open}
                aria-controls={conditionsId}
                onClick={() => setOpen(!open)}
                className="underline decoration-edge underline-offset-4 hover:text-ink"
              >
                {open ? "fewer conditions" : "more conditions"}
              </button>
            </div>
          </div>
          <Schematic
            circuit={current.circuit}
            sourceResistor={current.sourceResistor}
            channel={current.polarity === "p" ? "p" : "n"}
          />
        </div>
        <div id={conditionsId} hidden={!open} className="mt-6">
          {open && <MoreConditions form={form} onUnreadable={onUnreadable} />}
        </div>
      </form>
      {ranked && (
        <div className="mt-8 border-rule border-t pt-4">
          <RankingView
            brief={ranked}
            briefId={briefId}
            ranking={ranking}
            objective={objective}
            onObjectiveChange={(next) =>
              setSearch(
                (params) => {
                  if (next === DEFAULT_OBJECTIVE) params.delete("by");
                  else params.set("by", next);
                  // The list comes in the order that was asked for.
                  params.delete("sort");
                  return params;
                },
                { preventScrollReset: true },
              )
            }
            sort={readSort(search.get("sort"))}
            onSortChange={(sort) =>
              setSearch(
                (params) => {
                  if (sort) params.set("sort", writeSort(sort));
                  else params.delete("sort");
                  return params;
                },
                { replace: true, preventScrollReset: true },
              )
            }
            isStale={!ranking.isRanking && !isSameBrief(current, ranked)}
            onRelax={(relax) => {
              const relaxed = relaxBrief(ranked, relax);
              form.reset(relaxed, { keepDefaultValues: true });
              rank(relaxed);
            }}
          />
        </div>
      )}
    </>
  );
}

const DEFAULT_OBJECTIVE: Objective = "centred";

function readObjective(text: string | null): Objective {
  return OBJECTIVES.find((objective) => objective === text) ?? DEFAULT_OBJECTIVE;
}

/** "gain" sorts upward, "-gain" downward. */
function readSort(text: string | null): DataTableSort | null {
  if (!text) return null;
  return text.startsWith("-")
    ? { column: text.slice(1), descending: true }
    : { column: text, descending: false };
}

function writeSort({ column, descending }: DataTableSort): string {
  return descending ? `-${column}` : column;
}
