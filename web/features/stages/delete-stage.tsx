import type { ReactNode } from "react";
import type { Stage } from "#shared/schemas/stage";
import { problemOf } from "../../lib/api";
import { Button } from "../../ui/button";
import { showToast, showUndoToast } from "../../ui/toast";
import { useDeleteStage, useRestoreStage } from "./queries";

type DeleteStageProps = {
  stage: Stage;
  onDeleted?: () => void;
  /** What names the stage to a screen reader where several stand together. */
  label?: string;
  children: ReactNode;
};

/** Deletes a stage and offers to take that back. */
export function DeleteStage({ stage, onDeleted, label, children }: DeleteStageProps) {
  const remove = useDeleteStage();
  const restore = useRestoreStage();
  const tell = (error: unknown) => showToast(problemOf(error).title, { tone: "caution" });
  const deleteIt = () =>
    remove.mutate(stage.id, {
      onSuccess: () => {
        onDeleted?.();
        // By then the button is gone, and what was handed to mutate with it.
        showUndoToast(`Deleted "${stage.name}".`, () => restore.mutateAsync(stage.id).catch(tell));
      },
      onError: tell,
    });
  return (
    <Button
      variant="link"
      aria-label={label}
      busy={remove.isPending}
      onClick={(event) => {
        event.stopPropagation();
        deleteIt();
      }}
    >
      {children}
    </Button>
  );
}
