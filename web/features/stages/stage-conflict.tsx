import { useQueryClient } from "@tanstack/react-query";
import type { Problem } from "#shared/schemas/problem";
import { type Resistors, type Stage, stageSchema } from "#shared/schemas/stage";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { stageQuery } from "./queries";

type StageConflictProps = {
  problem: Problem;
  mine: { name: string; note: string; resistors: Resistors };
  onTake: (current: Stage) => void;
  onClose: () => void;
};

/** Somebody changed the stage meanwhile: says what differs and keeps what was typed in sight. */
export function StageConflict({ problem, mine, onTake, onClose }: StageConflictProps) {
  const client = useQueryClient();
  const current = stageSchema.safeParse(problem.current);
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="This stage was changed meanwhile"
      description={problem.detail}
      footer={
        <>
          <Button onClick={onClose}>Stay with mine</Button>
          {current.success && (
            <Button
              onClick={() => {
                client.setQueryData(stageQuery(current.data.id).queryKey, current.data);
                onTake(current.data);
              }}
            >
              Load the latest
            </Button>
          )}
        </>
      }
    >
      <ul className="border-ink border-t">
        {problem.errors.map(({ path, message }) => (
          <li
            key={path}
            className="flex items-baseline justify-between gap-6 border-rule border-b py-2 text-sm"
          >
            <span className="value">{path}</span>
            <span className="text-right">{message}</span>
          </li>
        ))}
      </ul>
      {mine.note && (
        <p className="mt-4 text-sm">
          <strong>Your note, to copy:</strong> <span className="whitespace-pre-line">{mine.note}</span>
        </p>
      )}
    </Dialog>
  );
}
