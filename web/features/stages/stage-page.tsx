import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import type { Problem } from "#shared/schemas/problem";
import type { Resistors, Stage } from "#shared/schemas/stage";
import { problemOf } from "../../lib/api";
import { formatDay } from "../../lib/dates";
import { useMay } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { MarginNote } from "../../ui/margin-note";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { showToast, showUndoToast } from "../../ui/toast";
import { ChangedValues } from "./changed-values";
import { KeepDialog } from "./keep-dialog";
import { stageQuery, useDeleteStage, useRestoreStage, useSaveStage } from "./queries";
import { StageConflict } from "./stage-conflict";
import { StageSheetView } from "./stage-sheet-view";
import { StageTitle } from "./stage-title";

/** A kept stage. */
export function StagePage() {
  const id = Number(useParams().id);
  const { data, error, refetch, isFetching } = useQuery(stageQuery(id));
  useDocumentTitle(data?.name ?? "Stage");
  if (error) return <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />;
  if (!data) return <SkeletonRows rows={6} label="The stage is being fetched" />;
  return <KeptStage key={data.id} stage={data} />;
}

type Change = { name: string; note: string; resistors: Resistors };

function KeptStage({ stage }: { stage: Stage }) {
  const mayWrite = useMay("design:write");
  const save = useSaveStage(stage.id);
  const [resistors, setResistors] = useState(stage.resistors);
  const [editing, setEditing] = useState(false);
  const [conflict, setConflict] = useState<{ problem: Problem; mine: Change } | null>(null);

  const store = (change: Change, done: string) =>
    save.mutate(
      { ...change, version: stage.version },
      {
        onSuccess: (next) => {
          setResistors(next.resistors);
          setEditing(false);
          showToast(done);
        },
        onError: (error) => {
          const problem = problemOf(error);
          if (problem.status === 409) {
            setEditing(false);
            setConflict({ problem, mine: change });
          } else if (!editing) showToast(problem.detail ?? problem.title, { tone: "caution" });
        },
      },
    );

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
                <Button variant="link" onClick={() => setEditing(true)}>
                  rename, note
                </Button>
                <DeleteStage stage={stage} />
              </>
            )}
          </>
        }
      />
      <StageSheetView
        part={stage.part}
        brief={stage.brief}
        resistors={resistors}
        onChange={setResistors}
        underResistors={
          <ChangedValues
            kept={stage.resistors}
            now={resistors}
            onBack={() => setResistors(stage.resistors)}
            onKeep={
              mayWrite
                ? () => store({ name: stage.name, note: stage.note, resistors }, "Kept the new values.")
                : null
            }
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
      <KeepDialog
        open={editing}
        onOpenChange={setEditing}
        title="Name and note"
        initial={{ name: stage.name, note: stage.note }}
        confirmLabel="Save"
        busy={save.isPending}
        error={editing ? save.error : null}
        onConfirm={({ name, note }) => store({ name, note, resistors: stage.resistors }, "Saved.")}
      />
      {conflict && (
        <StageConflict
          problem={conflict.problem}
          mine={conflict.mine}
          onTake={(current) => {
            setResistors(current.resistors);
            setConflict(null);
          }}
          onClose={() => setConflict(null)}
        />
      )}
    </>
  );
}

function DeleteStage({ stage }: { stage: Stage }) {
  const remove = useDeleteStage();
  const restore = useRestoreStage();
  const navigate = useNavigate();
  const tell = (error: unknown) => showToast(problemOf(error).title, { tone: "caution" });
  return (
    <Button
      variant="link"
      busy={remove.isPending}
      onClick={() =>
        remove.mutate(stage.id, {
          onSuccess: () => {
            navigate("/stages");
            showUndoToast(`Deleted "${stage.name}".`, () => restore.mutate(stage.id, { onError: tell }));
          },
          onError: tell,
        })
      }
    >
      delete
    </Button>
  );
}
