import { useQuery } from "@tanstack/react-query";
import { Link, useNavigate } from "react-router-dom";
import type { SavedBrief } from "#shared/schemas/brief";
import { problemOf } from "../../lib/api";
import { briefInWords, conditionsInWords } from "../../lib/brief-words";
import { formatDay } from "../../lib/dates";
import { briefsQuery } from "../../lib/lists";
import { useMay } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { DataTable } from "../../ui/data-table";
import type { DataTableColumn } from "../../ui/data-table-model";
import { EmptyState } from "../../ui/empty-state";
import { PageTitle } from "../../ui/page-title";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { showToast, showUndoToast } from "../../ui/toast";
import { useMediaQuery } from "../../ui/use-media-query";
import { useCreateBrief, useDeleteBrief, useRestoreBrief } from "./queries";

/** The team's saved briefs. */
export function BriefsPage() {
  useDocumentTitle("Briefs");
  const { data, error, refetch, isFetching } = useQuery(briefsQuery);
  const mayWrite = useMay("design:write");
  const isNarrow = !useMediaQuery("(width >= 52rem)");
  const navigate = useNavigate();
  const newBrief = (
    <Button asChild variant="main">
      <Link to="/briefs/new">{mayWrite ? "Write a brief" : "Try a brief"}</Link>
    </Button>
  );
  return (
    <>
      <PageTitle actions={newBrief}>Briefs</PageTitle>
      <div className="mt-6">
        {error ? (
          <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />
        ) : data === undefined ? (
          <SkeletonRows label="The briefs are being fetched" />
        ) : data.length === 0 ? (
          <EmptyState title="No brief yet." action={newBrief}>
            A brief says what a stage must do: rail, load, swing. Its ranked fits follow on the same page.
          </EmptyState>
        ) : (
          <DataTable
            label="Saved briefs"
            columns={columnsFor(mayWrite, isNarrow)}
            rows={data}
            rowId={(brief) => String(brief.id)}
            onOpen={(brief) => navigate(`/briefs/${brief.id}`)}
          />
        )}
      </div>
    </>
  );
}

function columnsFor(mayWrite: boolean, isNarrow: boolean): DataTableColumn<SavedBrief>[] {
  const conditions: DataTableColumn<SavedBrief> = {
    id: "conditions",
    header: "conditions",
    hideable: true,
    cell: ({ brief }) => <span className="text-quiet text-sm">{conditionsInWords(brief).join(" · ")}</span>,
  };
  return [
    {
      id: "name",
      header: "brief",
      sortValue: ({ name }) => name,
      cell: ({ name, brief }) => (
        <>
          <span className="block font-semibold">{name}</span>
          <span className="block text-quiet text-sm">{briefInWords(brief)}</span>
        </>
      ),
    },
    ...(isNarrow ? [] : [conditions]),
    {
      id: "version",
      header: "version",
      numeric: true,
      sortValue: ({ version }) => version,
      cell: ({ version }) => version,
    },
    {
      id: "changed",
      header: "changed",
      sortValue: ({ updatedAt }) => updatedAt,
      cell: ({ updatedAt, updatedBy }) => (
        <>
          <span className="block whitespace-nowrap">{formatDay(updatedAt)}</span>
          <span className="block whitespace-nowrap text-quiet text-sm">{updatedBy.name}</span>
        </>
      ),
    },
    ...(mayWrite
      ? [{ id: "actions", header: "", name: "Actions", align: "right", cell: Actions } as const]
      : []),
  ];
}

function Actions(brief: SavedBrief) {
  return <RowActions brief={brief} />;
}

function RowActions({ brief }: { brief: SavedBrief }) {
  const create = useCreateBrief();
  const remove = useDeleteBrief();
  const restore = useRestoreBrief();
  const tell = (error: unknown) => showToast(problemOf(error).title, { tone: "caution" });
  const duplicate = () =>
    create.mutate(
      { name: `${brief.name}, copy`.slice(0, 120), brief: brief.brief },
      { onSuccess: (copy) => showToast(`Made "${copy.name}".`), onError: tell },
    );
  const deleteIt = () =>
    remove.mutate(brief.id, {
      onSuccess: () =>
        // By then the row is gone, and what was handed to mutate with it.
        showUndoToast(`Deleted "${brief.name}".`, () => restore.mutateAsync(brief.id).catch(tell)),
      onError: tell,
    });
  return (
    <span className="inline-flex gap-4">
      <Button
        variant="link"
        aria-label={`Duplicate ${brief.name}`}
        busy={create.isPending}
        onClick={(event) => {
          event.stopPropagation();
          duplicate();
        }}
      >
        Duplicate
      </Button>
      <Button
        variant="link"
        aria-label={`Delete ${brief.name}`}
        busy={remove.isPending}
        onClick={(event) => {
          event.stopPropagation();
          deleteIt();
        }}
      >
        Delete
      </Button>
    </span>
  );
}
