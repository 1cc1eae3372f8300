import { queryOptions, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import type { Brief } from "#shared/schemas/brief";
import { type FitsResponse, fitsEventSchema, fitsResponseSchema } from "#shared/schemas/fits";
import { callApi, streamApi } from "../../lib/api";

export type RankingProgress = { partsDone: number; partsTotal: number };

const FITS_SHOWN = 1000;
const OTHER_SETS = 20;

/** A ranking as the page follows it. */
export type RankingState = {
  result: FitsResponse | undefined;
  error: unknown;
  isRanking: boolean;
  /** How far it has come; null before the first word from the server. */
  progress: RankingProgress | null;
  cancelled: boolean;
  rank: () => void;
  cancel: () => void;
};

/**
 * Ranks a brief on the server and follows its progress. The same brief is not ranked twice while its answer is fresh.
 *
 * @param brief null for none yet
 */
export function useRanking(brief: Brief | null): RankingState {
  const client = useQueryClient();
  const [progress, setProgress] = useState<RankingProgress | null>(null);
  const key = JSON.stringify(brief);
  // Cancelling holds for the brief it was about, so another one is ranked again.
  const [cancelledKey, setCancelledKey] = useState<string | null>(null);
  const cancelled = cancelledKey === key;
  const query = useQuery({
    queryKey: ["fits", brief],
    enabled: brief !== null && !cancelled,
    staleTime: 5 * 60_000,
    queryFn: async ({ signal }) => {
      setProgress(null);
      const body = { brief, objective: "centred", distinct: "part", limit: FITS_SHOWN };
      for await (const event of streamApi("/fits", { body, schema: fitsEventSchema, signal })) {
        if ("result" in event) return event.result;
        setProgress(event.progress);
      }
      throw new Error("The answer ended before its result");
    },
  });
  return {
    result: query.data,
    error: query.error,
    isRanking: query.isFetching,
    progress,
    cancelled: cancelled && !query.isFetching,
    rank: () => {
      setCancelledKey(null);
      void query.refetch();
    },
    cancel: () => {
      setCancelledKey(key);
      void client.cancelQueries({ queryKey: ["fits", brief] });
    },
  };
}

/** The best resistor sets of one part. */
export const otherSetsQuery = (brief: Brief, partId: number) =>
  queryOptions({
    queryKey: ["fits", brief, partId],
    staleTime: 5 * 60_000,
    queryFn: async ({ signal }) => {
      const body = {
        brief: { ...brief, parts: { ...brief.parts, ids: [partId] } },
        objective: "centred",
        distinct: "none",
        limit: OTHER_SETS,
      };
      return (await callApi("/fits", { method: "POST", body, schema: fitsResponseSchema, signal })).fits;
    },
  });
