import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import { type Brief, type SavedBrief, savedBriefSchema } from "#shared/schemas/brief";
import { callApi } from "../../lib/api";
import { briefsQuery } from "../../lib/lists";

const oneKey = (id: number) => ["briefs", id] as const;

export const briefQuery = (id: number) =>
  queryOptions({
    queryKey: oneKey(id),
    queryFn: ({ signal }) => callApi(`/briefs/${id}`, { schema: savedBriefSchema, signal }),
    // Nothing changes under one's hands: what somebody else saved meanwhile is told when one saves.
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });

/** Takes a brief that the server answered with into the cache. */
function useTakeIn() {
  const client = useQueryClient();
  return (brief: SavedBrief) => {
    client.setQueryData(oneKey(brief.id), brief);
    return client.invalidateQueries({ queryKey: briefsQuery.queryKey, exact: true });
  };
}

export function useCreateBrief() {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (input: { name: string; brief: Brief }) =>
      callApi("/briefs", { method: "POST", body: input, schema: savedBriefSchema }),
    onSuccess: takeIn,
  });
}

export function useSaveBrief(id: number) {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (input: { name: string; brief: Brief; version: number }) =>
      callApi(`/briefs/${id}`, { method: "PUT", body: input, schema: savedBriefSchema }),
    onSuccess: takeIn,
  });
}

export function useDeleteBrief() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: number) => callApi(`/briefs/${id}`, { method: "DELETE", schema: null }),
    onSuccess: (_answer, id) => {
      client.removeQueries({ queryKey: oneKey(id) });
      return client.invalidateQueries({ queryKey: briefsQuery.queryKey, exact: true });
    },
  });
}

export function useRestoreBrief() {
  const takeIn = useTakeIn();
  return useMutation({
    mutationFn: (id: number) =>
      callApi(`/briefs/${id}/restore`, { method: "POST", schema: savedBriefSchema }),
    onSuccess: takeIn,
  });
}
