import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { Link, useNavigate, useSearchParams } from "react-router-dom";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { problemOf } from "../../lib/api";
import { writeBriefParameter } from "../../lib/brief-link";
import { briefsQuery } from "../../lib/lists";
import { useMay } from "../../lib/session";
import { type LinkedFit, readStageLink, stageLink } from "../../lib/stage-link";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { EmptyState } from "../../ui/empty-state";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { showToast } from "../../ui/toast";
import { KeepDialog } from "./keep-dialog";
import { partQuery, useKeepStage } from "./queries";
import { StageSheetView } from "./stage-sheet-view";
import { StageTitle } from "./stage-title";

/** A fit that isn't kept: it lives in the address. */
export function NewStagePage() {
  const [search] = useSearchParams();
  const fit = useMemo(() => readStageLink(search), [search]);
  useDocumentTitle("Fit");
  if (!fit) {
    return (
      <EmptyState
        title="This address doesn't hold a fit."
        action={
          <Button asChild>
            <Link to="/briefs/new">Write a brief</Link>
          </Button>
        }
      >
        It may have been cut short on its way. Rank a brief and open a fit from there.
      </EmptyState>
    );
  }
  return <LoadedFit fit={fit} />;
}

function LoadedFit({ fit }: { fit: LinkedFit }) {
  const { data: part, error, refetch, isFetching } = useQuery(partQuery(fit.partId));
  if (error) return <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />;
  if (!part) return <SkeletonRows rows={6} label="The part is being fetched" />;
  return <FitSheet fit={fit} part={part} />;
}

function FitSheet({ fit, part }: { fit: LinkedFit; part: Part }) {
  const navigate = useNavigate();
  const mayWrite = useMay("design:write");
  const { data: briefs } = useQuery(briefsQuery);
  const saved = briefs?.find(({ id }) => id === fit.briefId);
  const name = `${saved?.name ?? "Stage"}${fit.place === null ? "" : `, fit ${fit.place}`}`;
  // Stepped away from the ranking, the values have no place in it any more.
  const step = (resistors: Resistors) =>
    navigate(stageLink({ ...fit, resistors, place: null }), { replace: true, preventScrollReset: true });
  return (
    <>
      <StageTitle
        name={name}
        part={part}
        origin={saved ? { briefId: saved.id, briefName: saved.name, briefVersion: saved.version } : null}
        actions={
          <>
            <Link
              to={briefAddress(fit)}
              className="text-quiet text-sm underline underline-offset-3 hover:text-ink"
            >
              back to the fits
            </Link>
            {mayWrite ? (
              <KeepIt fit={fit} name={name} />
            ) : (
              <span className="text-quiet text-sm">Owners and designers can keep this.</span>
            )}
          </>
        }
      />
      <StageSheetView
        stageId={null}
        part={part}
        brief={fit.brief}
        resistors={fit.resistors}
        onChange={step}
      />
    </>
  );
}

function briefAddress({ brief, briefId }: LinkedFit): string {
  const search = new URLSearchParams({ b: writeBriefParameter(brief) || "{}" });
  return `/briefs/${briefId ?? "new"}?${search}`;
}

const LONGEST_NAME = 120;

function KeepIt({ fit, name }: { fit: LinkedFit; name: string }) {
  const [open, setOpen] = useState(false);
  const keep = useKeepStage();
  const navigate = useNavigate();
  const { partId, resistors, brief, briefId } = fit;
  return (
    <>
      <Button variant="main" onClick={() => setOpen(true)}>
        Keep this stage
      </Button>
      <KeepDialog
        open={open}
        onOpenChange={setOpen}
        title="Keep this stage"
        initial={{ name: name.slice(0, LONGEST_NAME), note: "" }}
        confirmLabel="Keep it"
        busy={keep.isPending}
        error={keep.error}
        onConfirm={(input) =>
          keep.mutate(
            { ...input, partId, resistors, brief, briefId },
            {
              onSuccess: (stage) => {
                showToast(`Kept "${stage.name}".`);
                navigate(`/stages/${stage.id}`, { replace: true });
              },
            },
          )
        }
      />
    </>
  );
}
