import { queryOptions, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { z } from "zod";
import type { Brief } from "#shared/schemas/brief";
import {
  type Fit,
  type FitsResponse,
  fitsEventSchema,
  fitsResponseSchema,
  type Objective,
} from "#shared/schemas/fits";
import { callApi, streamApi } from "../../lib/api";

export type RankingProgress = { partsDone: number; partsTotal: number };

const FITS_SHOWN = 1000;
const OTHER_SETS = 20;

/** A line of the stream; one of a kind that this page doesn't know is passed over. */
const lineSchema = fitsEventSchema.or(
  z.looseObject({ result: z.undefined().optional() }).transform(() => null),
);

/** A ranking as the page follows it. */
export type RankingState = {
  result: FitsResponse | undefined;
  /** The first rows as they stand while the ranking goes on; they may still change. */
  provisional: readonly Fit[] | null;
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
export function useRanking(brief: Brief | null, objective: Objective): RankingState {
  const client = useQueryClient();
  const [progress, setProgress] = useState<RankingProgress | null>(null);
  const [provisional, setProvisional] = useState<{ key: string; fits: Fit[] } | null>(null);
  const queryKey = ["fits", brief, objective];
  const key = JSON.stringify(queryKey);
  // Cancelling holds for the brief it was about, so another one is ranked again.
  const [cancelledKey, setCancelledKey] = useState<string | null>(null);
  const cancelled = cancelledKey === key;
  const query = useQuery({
    queryKey,
    enabled: brief !== null && !cancelled,
    staleTime: 5 * 60_000,
    queryFn: async ({ signal }) => {
      setProgress(null);
      setProvisional(null);
      const body = { brief, objective, distinct: "part", limit: FITS_SHOWN };
      for await (const event of streamApi("/fits", { body, schema: lineSchema, signal })) {
        if (event === null) continue;
        if ("result" in event) return event.result;
        if ("fits" in event) setProvisional({ key, fits: event.fits });
        else setProgress(event.progress);
      }
      throw new Error("The answer ended before its result");
    },
  });
  return {
    result: query.data,
    error: query.error,
    isRanking: query.isFetching,
    progress,
    provisional: query.isFetching && provisional?.key === key ? provisional.fits : null,
    cancelled: cancelled && !query.isFetching,
    rank: () => {
      setCancelledKey(null);
      void query.refetch();
    },
    cancel: () => {
      setCancelledKey(key);
      void client.cancelQueries({ queryKey });
    },
  };
}

/** The best resistor sets of one part. */
export const otherSetsQuery = (brief: Brief, objective: Objective, partId: number) =>
  queryOptions({
    queryKey: ["fits", brief, objective, partId],
    staleTime: 5 * 60_000,
    queryFn: async ({ signal }) => {
      const body = {
        brief: { ...brief, parts: { ...brief.parts, ids: [partId] } },
        objective,
        distinct: "none",
        limit: OTHER_SETS,
      };
      return (await callApi("/fits", { method: "POST", body, schema: fitsResponseSchema, signal })).fits;
    },
  });
