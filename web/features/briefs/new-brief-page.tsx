import { useMemo, useState } from "react";
import { useNavigate, useSearchParams } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import { problemOf } from "../../lib/api";
import { readBriefParameter, STARTING_BRIEF } from "../../lib/brief-link";
import { useMay } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { PageTitle } from "../../ui/page-title";
import { ProblemMessage } from "../../ui/problem-message";
import { showToast } from "../../ui/toast";
import { BriefWorkbench } from "./brief-workbench";
import { NameDialog } from "./name-dialog";
import { useCreateBrief } from "./queries";

/** A brief that isn't saved: it lives in the address. */
export function NewBriefPage() {
  useDocumentTitle("New brief");
  const [search] = useSearchParams();
  const parameter = search.get("b");
  const linked = useMemo(() => readBriefParameter(parameter), [parameter]);
  const mayWrite = useMay("design:write");
  return (
    <>
      {parameter && !linked && (
        <div className="mb-6">
          <ProblemMessage
            problem={{
              title: "The brief in this address can't be read",
              detail: "It may have been cut short on its way. This is a fresh one.",
            }}
          />
        </div>
      )}
      <BriefWorkbench
        brief={linked ?? STARTING_BRIEF}
        ranked={parameter ? linked : null}
        briefId={null}
        title={({ validate }) => (
          <PageTitle size="small" aside="not saved" actions={mayWrite && <SaveNew validate={validate} />}>
            New brief
          </PageTitle>
        )}
      />
    </>
  );
}

function SaveNew({ validate }: { validate: () => Promise<Brief | null> }) {
  const [brief, setBrief] = useState<Brief | null>(null);
  const create = useCreateBrief();
  const navigate = useNavigate();
  return (
    <>
      <Button onClick={async () => setBrief(await validate())}>Save this brief</Button>
      <NameDialog
        open={brief !== null}
        onOpenChange={(open) => !open && setBrief(null)}
        title="Save this brief"
        initial=""
        confirmLabel="Save"
        busy={create.isPending}
        error={create.error ? (problemOf(create.error).detail ?? problemOf(create.error).title) : null}
        onConfirm={(name) =>
          brief &&
          create.mutate(
            { name, brief },
            {
              onSuccess: (saved) => {
                showToast(`Saved "${saved.name}".`);
                navigate(`/briefs/${saved.id}`, { replace: true });
              },
            },
          )
        }
      />
    </>
  );
}
