import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { Link, useNavigate } from "react-router-dom";
import { assuredSwing, boxOf } from "#shared/bias/spread";
import { figureStage, type StageFigures } from "#shared/bias/stage-sheet";
import type { Swing } from "#shared/schemas/bias";
import { RESISTOR_KEYS, type ResistorKey } from "#shared/schemas/circuit";
import type { Stage } from "#shared/schemas/stage";
import { BalanceBar } from "../../figures/balance-bar";
import { problemOf } from "../../lib/api";
import { formatDay } from "../../lib/dates";
import { stagesQuery } from "../../lib/lists";
import { useMay } from "../../lib/session";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { DataTable } from "../../ui/data-table";
import type { DataTableColumn } from "../../ui/data-table-model";
import { EmptyState } from "../../ui/empty-state";
import { PageTitle } from "../../ui/page-title";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { useMediaQuery } from "../../ui/use-media-query";
import { Value } from "../../ui/value";
import { DeleteStage } from "./delete-stage";

type Row = { stage: Stage; figures: StageFigures; assured: Swing };

function rowOf(stage: Stage): Row {
  const { part, brief, resistors } = stage;
  const figures = figureStage(part, brief, resistors);
  return { stage, figures, assured: assuredSwing(boxOf(part, brief, figures.values)).swing };
}

/** The team's kept stages. */
export function StagesPage() {
  useDocumentTitle("Stages");
  const { data, error, refetch, isFetching } = useQuery(stagesQuery);
  const mayWrite = useMay("design:write");
  const navigate = useNavigate();
  const isNarrow = !useMediaQuery("(width >= 52rem)");
  const rows = useMemo(() => data?.map(rowOf), [data]);
  return (
    <>
      <PageTitle>Stages</PageTitle>
      <div className="mt-6">
        {error ? (
          <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />
        ) : rows === undefined ? (
          <SkeletonRows label="The stages are being fetched" />
        ) : rows.length === 0 ? (
          <EmptyState
            title="No stage kept yet."
            action={
              <Button asChild variant="main">
                <Link to="/briefs/new">Write a brief</Link>
              </Button>
            }
          >
            Rank a brief, open a fit and keep it: its values are frozen here, with its load line.
          </EmptyState>
        ) : (
          <DataTable
            label="Kept stages"
            columns={columnsFor(mayWrite, isNarrow, rows)}
            rows={rows}
            rowId={({ stage }) => String(stage.id)}
            onOpen={({ stage }) => navigate(`/stages/${stage.id}`)}
          />
        )}
      </div>
    </>
  );
}

/** The resistors that some stage has: circuits differ in theirs. */
function resistorsAmong(rows: readonly Row[]): ResistorKey[] {
  return RESISTOR_KEYS.filter((key) => rows.some(({ stage }) => stage.resistors[key] > 0));
}

function columnsFor(mayWrite: boolean, isNarrow: boolean, rows: readonly Row[]): DataTableColumn<Row>[] {
  const name: DataTableColumn<Row> = {
    id: "name",
    header: "stage",
    sortValue: ({ stage }) => stage.name,
    cell: ({ stage }) => (
      <>
        <span className="block font-semibold leading-5">{stage.name}</span>
        <span className="block text-quiet text-xs">
          {stage.part.partNumber} · {stage.part.maker} · {stage.part.package}
        </span>
      </>
    ),
  };
  const balance: DataTableColumn<Row> = {
    id: "balance",
    header: (
      <span>
        <span className="text-ohmic">ohmic</span> ← room each way →{" "}
        <span className="text-cutoff-ink">cutoff</span>
      </span>
    ),
    name: "Room each way",
    className: "min-w-56",
    // Stages differ in their rails, so each bar has its own scale: what compares is how centred they are.
    cell: ({ figures: { bias }, assured }) =>
      bias.swing && (
        <BalanceBar
          towardOhmic={bias.swing.towardOhmic}
          towardCutoff={bias.swing.towardCutoff}
          assured={assured}
          scale={Math.max(bias.swing.towardOhmic, bias.swing.towardCutoff)}
        />
      ),
  };
  const resistors = resistorsAmong(rows).map(
    (id): DataTableColumn<Row> => ({
      id,
      header: id.toUpperCase(),
      numeric: true,
      hideable: true,
      sortValue: ({ stage }) => stage.resistors[id],
      cell: ({ stage }) => (stage.resistors[id] > 0 ? <Value number={stage.resistors[id]} unit="Ω" /> : "—"),
    }),
  );
  const figures: DataTableColumn<Row>[] = [
    {
      id: "centring",
      header: "off centre",
      numeric: true,
      sortValue: ({ figures: { bias } }) => bias.centringError,
      cell: ({ figures: { bias } }) => <Value number={bias.centringError} unit="%" decimals={1} />,
    },
    {
      id: "swing",
      header: "swing",
      numeric: true,
      sortValue: ({ figures: { bias } }) => bias.swing?.symmetric,
      cell: ({ figures: { bias } }) => <Value number={bias.swing?.symmetric} unit="V" />,
    },
    {
      id: "assured",
      header: <span className="inline-block w-14">assured swing</span>,
      name: "Assured swing",
      numeric: true,
      hideable: true,
      sortValue: ({ assured }) => assured.symmetric,
      cell: ({ assured }) => (assured.symmetric > 0 ? <Value number={assured.symmetric} unit="V" /> : "none"),
    },
    {
      id: "rail",
      header: "rail",
      numeric: true,
      sortValue: ({ stage }) => stage.brief.rail.volts,
      cell: ({ stage }) => <Value number={stage.brief.rail.volts} unit="V" exact />,
    },
    {
      id: "gain",
      header: "gain",
      numeric: true,
      hideable: true,
      sortValue: ({ figures: { bias } }) => Math.abs(bias.gain),
      cell: ({ figures: { bias } }) => <Value number={bias.gain} unit="" />,
    },
    {
      id: "drain-current",
      header: (
        <span>
          I<sub>D</sub>
        </span>
      ),
      name: "Drain current",
      numeric: true,
      hideable: true,
      sortValue: ({ figures: { bias } }) => bias.id,
      cell: ({ figures: { bias } }) => <Value number={bias.id} unit="A" />,
    },
    {
      id: "origin",
      header: "from brief",
      hideable: true,
      sortValue: ({ stage }) => stage.origin?.briefName,
      cell: ({ stage: { origin } }) =>
        origin && (
          <>
            <Link
              to={`/briefs/${origin.briefId}`}
              className="block underline underline-offset-3 hover:text-ink"
            >
              {origin.briefName}
            </Link>
            <span className="block text-quiet text-sm">version {origin.briefVersion}</span>
          </>
        ),
    },
    {
      id: "changed",
      header: "changed",
      sortValue: ({ stage }) => stage.updatedAt,
      cell: ({ stage }) => (
        <>
          <span className="block whitespace-nowrap">{formatDay(stage.updatedAt)}</span>
          <span className="block whitespace-nowrap text-quiet text-sm">{stage.updatedBy.name}</span>
        </>
      ),
    },
  ];
  if (mayWrite) {
    figures.push({
      id: "actions",
      header: "",
      name: "Actions",
      align: "right",
      cell: ({ stage }) => (
        <DeleteStage stage={stage} label={`Delete ${stage.name}`}>
          Delete
        </DeleteStage>
      ),
    });
  }
  return isNarrow ? [name, balance, ...figures, ...resistors] : [name, ...resistors, balance, ...figures];
}
