import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import { partSchema } from "#shared/schemas/part";
import { type keepStageSchema, type Stage, stageSchema, type UpdateStage } from "#shared/schemas/stage";
import {
  fitYieldsResponseSchema,
  type StageYieldResponse,
  stageYieldResponseSchema,
} from "#shared/schemas/yield";
import { callApi } from "../../lib/api";
import { stagesQuery } from "../../lib/lists";

const oneKey = (id: number) => ["stages", id] as const;

export const stageQuery = (id: number) =>
  queryOptions({
    queryKey: oneKey(id),
    queryFn: ({ signal }) => callApi(`/stages/${id}`, { schema: stageSchema, signal }),
    // Nothing changes under one's hands: what somebody else saved meanwhile is told when one saves.
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });

/** The part of a fit that isn't kept yet. */
export const partQuery = (id: number) =>
  queryOptions({
    queryKey: ["parts", id],
    queryFn: ({ signal }) => callApi(`/parts/${id}`, { schema: partSchema, signal }),
  });

/** Builds of one yield: its interval is within 0.7 percentage points. */
export const YIELD_BUILDS = 20_000;
const YIELD_SEED = 1;

/** The yield of a kept stage, or of a fit that isn't kept, with the values as they are tried. */
export const yieldQuery = ({
  stageId,
  partId,
  brief,
  resistors,
}: {
  stageId: number | null;
  partId: number;
  brief: Brief;
  resistors: Resistors;
}) =>
  queryOptions({
    queryKey: ["stage-yield", stageId, partId, brief, resistors],
    // The same builds every time, so the answer never changes.
    staleTime: Number.POSITIVE_INFINITY,
    queryFn: async ({ signal }): Promise<StageYieldResponse> => {
      if (stageId !== null) {
        const body = { resistors, builds: YIELD_BUILDS, seed: YIELD_SEED };
        return callApi(`/stages/${stageId}/yield`, {
          method: "POST",
          body,
          schema: stageYieldResponseSchema,
          signal,
        });
      }
      const body = { brief, fits: [{ partId, resistors }], builds: YIELD_BUILDS, seed: YIELD_SEED };
      const { yields } = await callApi("/fits/yield", {
        method: "POST",
        body,
        schema: fitYieldsResponseSchema,
        signal,
      });
      return { yield: yields[0], costliest: null };
    },
  });

/** Takes a stage that the server answered with into the cache. */
function useTakeIn() {
  const client = useQueryClient();
  return (stage: Stage) => {
    client.setQueryData(oneKey(stage.id), stage);
    return client.invalidateQueries({ queryKey: stagesQuery.queryKey, exact: true });
  };
}

export function useKeepStage() {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (input: z.input<typeof keepStageSchema>) =>
      callApi("/stages", { method: "POST", body: input, schema: stageSchema }),
    onSuccess: takeIn,
  });
}

export function useSaveStage(id: number) {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (input: UpdateStage) =>
      callApi(`/stages/${id}`, { method: "PUT", body: input, schema: stageSchema }),
    onSuccess: takeIn,
  });
}

export function useDeleteStage() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: number) => callApi(`/stages/${id}`, { method: "DELETE", schema: null }),
    onSuccess: (_answer, id) => {
      client.removeQueries({ queryKey: oneKey(id) });
      return client.invalidateQueries({ queryKey: stagesQuery.queryKey, exact: true });
    },
  });
}

export function useRestoreStage() {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (id: number) => callApi(`/stages/${id}/restore`, { method: "POST", schema: stageSchema }),
    onSuccess: takeIn,
  });
}
