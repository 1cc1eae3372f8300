import { useMemo } from "react";
import { useNavigate } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import type { Fit } from "#shared/schemas/fits";
import { DataTable } from "../../ui/data-table";
import type { DataTableSort } from "../../ui/data-table-model";
import { useMediaQuery } from "../../ui/use-media-query";
import { fitColumns, linkTo } from "./fit-columns";
import { OtherSets } from "./other-sets";

type FitsTableProps = {
  fits: readonly Fit[];
  brief: Brief;
  briefId: number | null;
  sort: DataTableSort | null;
  onSortChange: (sort: DataTableSort | null) => void;
};

/** The ranked fits: one row a part, each opening to its sheet and expanding to its other resistor sets. */
export function FitsTable({ fits, brief, briefId, sort, onSortChange }: FitsTableProps) {
  const navigate = useNavigate();
  const isNarrow = !useMediaQuery("(width >= 52rem)");
  const scale = useMemo(() => largestRoom(fits), [fits]);
  const columns = useMemo(() => fitColumns(brief, scale, isNarrow), [brief, scale, isNarrow]);
  const places = useMemo(() => new Map(fits.map((fit, index) => [fit.part.id, index + 1])), [fits]);
  return (
    <DataTable
      label="Ranked fits"
      columns={columns}
      rows={fits}
      rowId={(fit) => String(fit.part.id)}
      sort={sort}
      onSortChange={onSortChange}
      pageSize={60}
      onOpen={(fit) => navigate(linkTo(fit, brief, briefId, places.get(fit.part.id) ?? null))}
      renderExpanded={(fit) => (
        <OtherSets brief={brief} briefId={briefId} partId={fit.part.id} scale={scale} />
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
