import { useState } from "react";
import { useBlocker, useNavigate, useSearchParams } from "react-router-dom";
import type { Brief, SavedBrief } from "#shared/schemas/brief";
import type { Problem } from "#shared/schemas/problem";
import { problemOf } from "../../lib/api";
import { isSameBrief } from "../../lib/brief-link";
import { useMay } from "../../lib/session";
import { Button } from "../../ui/button";
import { ConfirmDialog } from "../../ui/dialog";
import { PageTitle } from "../../ui/page-title";
import { showToast } from "../../ui/toast";
import { ConflictDialog } from "./conflict-dialog";
import { NameDialog } from "./name-dialog";
import { useSaveBrief } from "./queries";

type SavedBriefTitleProps = { saved: SavedBrief; current: Brief; validate: () => Promise<Brief | null> };

/** A saved brief's name, version and state, with what can be done about them. */
export function SavedBriefTitle({ saved, current, validate }: SavedBriefTitleProps) {
  const mayWrite = useMay("design:write");
  const isDirty = !isSameBrief(current, saved.brief);
  const save = useSaveBrief(saved.id);
  const [, setSearch] = useSearchParams();
  const navigate = useNavigate();
  const [renaming, setRenaming] = useState(false);
  const [conflict, setConflict] = useState<{ problem: Problem; mine: Brief } | null>(null);

  const store = (name: string, brief: Brief) =>
    save.mutate(
      { name, brief, version: saved.version },
      {
        onSuccess: (next) => {
          setRenaming(false);
          setSearch(
            (params) => {
              params.delete("b");
              return params;
            },
            { replace: true },
          );
          showToast(`Saved version ${next.version}.`);
        },
        onError: (error) => {
          const problem = problemOf(error);
          if (problem.status === 409) setConflict({ problem, mine: brief });
          else if (!renaming) showToast(problem.detail ?? problem.title, { tone: "caution" });
        },
      },
    );
  const saveChanges = async () => {
    const valid = await validate();
    if (valid) store(saved.name, valid);
  };

  return (
    <>
      <PageTitle
        size="small"
        aside={`version ${saved.version} · ${isDirty ? "changes not saved" : "saved"}`}
        actions={
          mayWrite && (
            <>
              <Button variant="link" onClick={() => setRenaming(true)}>
                rename
              </Button>
              {isDirty && (
                <Button busy={save.isPending} onClick={saveChanges}>
                  Save version {saved.version + 1}
                </Button>
              )}
            </>
          )
        }
      >
        {saved.name}
      </PageTitle>
      <NameDialog
        open={renaming}
        onOpenChange={setRenaming}
        title="Rename this brief"
        initial={saved.name}
        confirmLabel="Rename"
        busy={save.isPending}
        error={save.error && renaming ? (problemOf(save.error).detail ?? null) : null}
        onConfirm={(name) => store(name, saved.brief)}
      />
      {conflict && (
        <ConflictDialog
          saved={saved}
          problem={conflict.problem}
          mine={conflict.mine}
          onClose={() => setConflict(null)}
          onCopied={(copy) => navigate(`/briefs/${copy.id}`)}
        />
      )}
      {mayWrite && <LeaveGuard isDirty={isDirty} />}
    </>
  );
}

/** Asks before changes are left behind. A fit's sheet is no leaving: its address carries the brief. */
function LeaveGuard({ isDirty }: { isDirty: boolean }) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) =>
      isDirty &&
      nextLocation.pathname !== currentLocation.pathname &&
      !nextLocation.pathname.startsWith("/stages/new"),
  );
  return (
    <ConfirmDialog
      open={blocker.state === "blocked"}
      onOpenChange={(open) => !open && blocker.reset?.()}
      title="Leave without saving?"
      description="The brief has changes that are not saved. They are lost when you leave."
      confirmLabel="Leave"
      onConfirm={() => blocker.proceed?.()}
    />
  );
}
