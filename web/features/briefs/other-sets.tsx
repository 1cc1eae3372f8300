import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { useNavigate } from "react-router-dom";
import type { Brief } from "#shared/schemas/brief";
import { pickResistors } from "#shared/schemas/circuit";
import type { Objective } from "#shared/schemas/fits";
import { problemOf } from "../../lib/api";
import { DataTable } from "../../ui/data-table";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { useMediaQuery } from "../../ui/use-media-query";
import { linkTo, setColumns } from "./fit-columns";
import { otherSetsQuery } from "./use-ranking";

type OtherSetsProps = {
  brief: Brief;
  briefId: number | null;
  objective: Objective;
  partId: number;
  scale: number;
};

/** A part's best resistor sets, ranked among themselves. */
export function OtherSets({ brief, briefId, objective, partId, scale }: OtherSetsProps) {
  const { data, error, refetch, isFetching } = useQuery(otherSetsQuery(brief, objective, partId));
  const navigate = useNavigate();
  const isNarrow = !useMediaQuery("(width >= 52rem)");
  const columns = useMemo(
    () => setColumns({ brief, scale, isNarrow, isProvisional: false }),
    [brief, scale, isNarrow],
  );
  if (error) return <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />;
  if (!data) return <SkeletonRows rows={3} label="Ranking this part's resistor sets" />;
  return (
    <DataTable
      label={`Resistor sets of ${data[0]?.part.partNumber ?? "this part"}`}
      columns={columns}
      rows={data}
      rowId={(fit) => Object.values(pickResistors(fit)).join(" ")}
      onOpen={(fit) => navigate(linkTo(fit, brief, briefId, null))}
    />
  );
}
