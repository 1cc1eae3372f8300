import { useMemo } from "react";
import { useNavigate } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import type { Fit, Objective } from "#shared/schemas/fits";
import { DataTable } from "../../ui/data-table";
import type { DataTableSort } from "../../ui/data-table-model";
import { useMediaQuery } from "../../ui/use-media-query";
import { fitColumns, linkTo } from "./fit-columns";
import { OtherSets } from "./other-sets";

type FitsTableProps = {
  fits: readonly Fit[];
  /** The ranking goes on, so the rows may still change. */
  isProvisional: boolean;
  brief: Brief;
  briefId: number | null;
  objective: Objective;
  sort: DataTableSort | null;
  onSortChange: (sort: DataTableSort | null) => void;
};

/** The ranked fits: one row a part, each opening to its sheet and expanding to its other resistor sets. */
export function FitsTable(props: FitsTableProps) {
  const { fits, isProvisional, brief, briefId, objective, sort, onSortChange } = props;
  const navigate = useNavigate();
  const isNarrow = !useMediaQuery("(width >= 52rem)");
  const scale = useMemo(() => largestRoom(fits), [fits]);
  const columns = useMemo(
    () => fitColumns({ brief, scale, isNarrow, isProvisional }),
    [brief, scale, isNarrow, isProvisional],
  );
  const places = useMemo(() => new Map(fits.map((fit, index) => [fit.part.id, index + 1])), [fits]);
  return (
    <DataTable
      label="Ranked fits"
      columns={columns}
      rows={fits}
      rowId={(fit) => String(fit.part.id)}
      // An address may name a column of another circuit.
      sort={columns.some(({ id }) => id === sort?.column) ? sort : null}
      onSortChange={onSortChange}
      pageSize={60}
      onOpen={(fit) => navigate(linkTo(fit, brief, briefId, places.get(fit.part.id) ?? null))}
      renderExpanded={(fit) => (
        <OtherSets brief={brief} objective={objective} briefId={briefId} partId={fit.part.id} scale={scale} />
      )}
    />
  );
}

function largestRoom(fits: readonly Fit[]): number {
  return Math.max(
    0,
    ...fits.map(({ bias }) => Math.max(bias.swing?.towardCutoff ?? 0, bias.swing?.towardOhmic ?? 0)),
  );
}
