import { queryOptions, useQuery } from "@tanstack/react-query";
import type { Brief } from "#shared/schemas/brief";
import { pickResistors } from "#shared/schemas/circuit";
import type { Fit } from "#shared/schemas/fits";
import { formatCount, formatPercent } from "#shared/values/engineering";
import { problemOf } from "../../lib/api";
import { Explained } from "./explained";
import { askForYield } from "./yield-queue";

const yieldQuery = (brief: Brief, fit: Fit) =>
  queryOptions({
    queryKey: ["yield", brief, fit.part.id, pickResistors(fit)],
    // The same builds every time, so the answer never changes.
    staleTime: Number.POSITIVE_INFINITY,
    queryFn: ({ signal }) => askForYield(brief, fit, signal),
  });

type YieldCellProps = {
  brief: Brief;
  fit: Fit;
  /** The row may still go, so nothing is asked about it. */
  isProvisional: boolean;
};

/** A fit's yield, asked for once its row is drawn. */
export function YieldCell({ brief, fit, isProvisional }: YieldCellProps) {
  const { data, error } = useQuery({ ...yieldQuery(brief, fit), enabled: !isProvisional });
  if (error) return <Explained explanation={problemOf(error).title}>—</Explained>;
  if (!data) return <Explained explanation="not worked out yet">—</Explained>;
  const { fraction, low, high, builds } = data;
  const interval = `95 % interval ${formatPercent(low)} to ${formatPercent(high)}, from ${formatCount(builds)} builds`;
  return <Explained explanation={interval}>{formatPercent(fraction)}</Explained>;
}
