import { useQueryClient } from "@tanstack/react-query";
import { useSearchParams } from "react-router-dom";
import { type Brief, type SavedBrief, savedBriefSchema } from "#shared/schemas/brief";
import type { Problem } from "#shared/schemas/problem";
import { problemOf } from "../../lib/api";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { showToast } from "../../ui/toast";
import { briefQuery, useCreateBrief } from "./queries";

type ConflictDialogProps = {
  saved: SavedBrief;
  problem: Problem;
  mine: Brief;
  onClose: () => void;
  onCopied: (copy: SavedBrief) => void;
};

/** Somebody saved meanwhile: says what changed, and lets both versions live. */
export function ConflictDialog({ saved, problem, mine, onClose, onCopied }: ConflictDialogProps) {
  const client = useQueryClient();
  const create = useCreateBrief();
  const [, setSearch] = useSearchParams();
  const current = savedBriefSchema.safeParse(problem.current);

  const takeTheirs = () => {
    setSearch(
      (params) => {
        params.delete("b");
        return params;
      },
      { replace: true },
    );
    if (current.success) client.setQueryData(briefQuery(saved.id).queryKey, current.data);
    onClose();
  };
  const copyMine = () =>
    create.mutate(
      { name: `${saved.name}, my copy`.slice(0, 120), brief: mine },
      {
        onSuccess: onCopied,
        onError: (error) => showToast(problemOf(error).title, { tone: "caution" }),
      },
    );

  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="This brief was changed meanwhile"
      description={problem.detail}
      footer={
        <>
          <Button onClick={copyMine} busy={create.isPending}>
            Save mine as a copy
          </Button>
          <Button onClick={takeTheirs}>Take the new version</Button>
        </>
      }
    >
      <ul className="border-ink border-t">
        {problem.errors.map(({ path, message }) => (
          <li key={path} className="flex items-baseline justify-between gap-6 border-rule border-b py-2">
            <span className="value text-sm">{path}</span>
            <span className="text-right text-sm">{message}</span>
          </li>
        ))}
      </ul>
    </Dialog>
  );
}
