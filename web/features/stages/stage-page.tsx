import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import type { Problem } from "#shared/schemas/problem";
import type { Stage, UpdateStage } from "#shared/schemas/stage";
import { problemOf } from "../../lib/api";
import { formatDay } from "../../lib/dates";
import { useMay } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { MarginNote } from "../../ui/margin-note";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { showToast } from "../../ui/toast";
import { ChangedValues } from "./changed-values";
import { DeleteStage } from "./delete-stage";
import { KeepDialog, type NameAndNote } from "./keep-dialog";
import { stageQuery, useSaveStage } from "./queries";
import { StageConflict } from "./stage-conflict";
import { StageSheetView } from "./stage-sheet-view";
import { StageTitle } from "./stage-title";
import { useTriedValues } from "./use-tried-values";

/** A kept stage. */
export function StagePage() {
  const id = Number(useParams().id);
  const { data, error, refetch, isFetching } = useQuery(stageQuery(id));
  useDocumentTitle(data?.name ?? "Stage");
  if (error) return <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />;
  if (!data) return <SkeletonRows rows={6} label="The stage is being fetched" />;
  return <KeptStage key={data.id} stage={data} />;
}

/** What is typed, and the stage it is typed over, whose version the save must still find. */
type Draft = { words: NameAndNote; base: Stage };

function KeptStage({ stage }: { stage: Stage }) {
  const mayWrite = useMay("design:write");
  const save = useSaveStage(stage.id);
  const navigate = useNavigate();
  const { resistors, tryValues, backToKept } = useTriedValues(stage.resistors);
  const [draft, setDraft] = useState<Draft | null>(null);
  const [conflict, setConflict] = useState<Problem | null>(null);

  const store = (change: UpdateStage, onKept: () => void) =>
    save.mutate(change, {
      onSuccess: onKept,
      onError: (error) => {
        const problem = problemOf(error);
        if (problem.status === 409) setConflict(problem);
        else if (draft === null) showToast(problem.detail ?? problem.title, { tone: "caution" });
      },
    });
  const storeValues = () =>
    store({ name: stage.name, note: stage.note, resistors, version: stage.version }, () => {
      backToKept();
      showToast("Kept the new values.");
    });
  const storeWords = (words: NameAndNote, base: Stage) => {
    setDraft({ words, base });
    store({ ...words, resistors: base.resistors, version: base.version }, () => {
      setDraft(null);
      showToast("Saved.");
    });
  };
  const edit = () => {
    save.reset();
    setDraft({ words: { name: stage.name, note: stage.note }, base: stage });
  };
  const takeLatest = (current: Stage) => {
    save.reset();
    setDraft(draft && laidOver(current, draft));
    setConflict(null);
  };

  return (
    <>
      <StageTitle
        name={stage.name}
        part={stage.part}
        origin={stage.origin}
        actions={
          <>
            <Button variant="link" onClick={() => window.print()}>
              print
            </Button>
            {mayWrite && (
              <>
                <Button variant="link" onClick={edit}>
                  rename, note
                </Button>
                <DeleteStage stage={stage} onDeleted={() => navigate("/stages")}>
                  delete
                </DeleteStage>
              </>
            )}
          </>
        }
      />
      <StageSheetView
        stageId={stage.id}
        part={stage.part}
        brief={stage.brief}
        resistors={resistors}
        onChange={tryValues}
        underResistors={
          <ChangedValues
            kept={stage.resistors}
            now={resistors}
            onBack={backToKept}
            onKeep={mayWrite ? storeValues : null}
            busy={save.isPending}
          />
        }
        underFigure={
          <div className="max-w-prose">
            <MarginNote lead={stage.note ? "Note." : undefined}>
              {stage.note && <span className="whitespace-pre-line">{stage.note} </span>}
              <span className="text-quiet">
                Kept by {stage.createdBy.name}, {formatDay(stage.createdAt)}
                {stage.version > 1 && `; changed by ${stage.updatedBy.name}, ${formatDay(stage.updatedAt)}`}.
                The part's figures are as they were on that day.
              </span>
            </MarginNote>
          </div>
        }
      />
      {draft && (
        <KeepDialog
          open={conflict === null}
          onOpenChange={(open) => !open && conflict === null && setDraft(null)}
          title="Name and note"
          initial={draft.words}
          confirmLabel="Save"
          busy={save.isPending}
          error={save.error}
          onConfirm={(words) => storeWords(words, draft.base)}
        />
      )}
      {conflict && (
        <StageConflict
          problem={conflict}
          kept={draft?.base ?? stage}
          onTake={takeLatest}
          onClose={() => setConflict(null)}
        />
      )}
    </>
  );
}

/** Lays what was typed over a newer stage; null where nothing of it is left to save. */
function laidOver(current: Stage, { words, base }: Draft): Draft | null {
  const name = words.name === base.name ? current.name : words.name;
  const note = words.note === base.note ? current.note : words.note;
  const isSaved = name === current.name && note === current.note;
  return isSaved ? null : { words: { name, note }, base: current };
}
