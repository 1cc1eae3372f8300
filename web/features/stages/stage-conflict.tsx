import { useQueryClient } from "@tanstack/react-query";
import type { Resistors } from "#shared/schemas/circuit";
import type { Problem } from "#shared/schemas/problem";
import { type Stage, stageSchema } from "#shared/schemas/stage";
import { formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { stageQuery } from "./queries";

type StageConflictProps = {
  problem: Problem;
  /** The stage as it was when the change began. */
  kept: Stage;
  onTake: (current: Stage) => void;
  onClose: () => void;
};

/** Somebody changed the stage meanwhile: says who changed what. Nothing typed or stepped is lost either way. */
export function StageConflict({ problem, kept, onTake, onClose }: StageConflictProps) {
  const client = useQueryClient();
  const { resistances } = usePreferences();
  const current = stageSchema.safeParse(problem.current).data;
  const changes = current && theirChanges(kept, current, (ohms) => formatResistance(ohms, resistances));
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="This stage was changed meanwhile"
      description={problem.detail}
      footer={
        <>
          <Button variant="quiet" onClick={onClose}>
            Not now
          </Button>
          {current && (
            <Button
              onClick={() => {
                client.setQueryData(stageQuery(current.id).queryKey, current);
                onTake(current);
              }}
            >
              Load the latest
            </Button>
          )}
        </>
      }
    >
      {changes && changes.length > 0 && (
        <dl className="border-ink border-t">
          {changes.map(({ name, words }) => (
            <div
              key={name}
              className="flex items-baseline justify-between gap-6 border-rule border-b py-2 text-sm"
            >
              <dt>{name}</dt>
              <dd className="value whitespace-pre-line text-right">{words}</dd>
            </div>
          ))}
        </dl>
      )}
      <p className="mt-3 text-sm">
        {current
          ? "Load the latest and what you changed is laid over it, still to be kept."
          : "Reload the page to see the latest; what you changed isn't kept yet."}
      </p>
    </Dialog>
  );
}

function theirChanges(kept: Stage, current: Stage, show: (ohms: number) => string) {
  const changes: { name: string; words: string }[] = [];
  if (current.name !== kept.name) changes.push({ name: "Name", words: `${kept.name} → ${current.name}` });
  for (const name of Object.keys(kept.resistors) as (keyof Resistors)[]) {
    const [before, now] = [kept.resistors[name], current.resistors[name]];
    if (before !== now) changes.push({ name: name.toUpperCase(), words: `${show(before)} → ${show(now)}` });
  }
  if (current.note !== kept.note) changes.push({ name: "Note", words: current.note || "taken away" });
  return changes;
}
