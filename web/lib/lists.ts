import { queryOptions } from "@tanstack/react-query";
import { briefListSchema } from "#shared/schemas/brief";
import { stageListSchema } from "#shared/schemas/stage";
import { callApi } from "./api";

/** The team's saved briefs, the latest change first. */
export const briefsQuery = queryOptions({
  queryKey: ["briefs"],
  queryFn: async ({ signal }) => (await callApi("/briefs", { schema: briefListSchema, signal })).items,
});

/** The team's kept stages, the latest change first. */
export const stagesQuery = queryOptions({
  queryKey: ["stages"],
  queryFn: async ({ signal }) => (await callApi("/stages", { schema: stageListSchema, signal })).items,
});
