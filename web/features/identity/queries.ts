import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import { type DemoAccounts, demoAccountsSchema, type SignIn } from "#shared/schemas/identity";
import { callApi, ProblemError } from "../../lib/api";
import { meQuery } from "../../lib/session";

/** The demo's accounts; null where no demo runs. */
export const demoQuery = queryOptions({
  queryKey: ["demo"],
  queryFn: async ({ signal }): Promise<DemoAccounts | null> => {
    try {
      return await callApi("/auth/demo", { schema: demoAccountsSchema, signal });
    } catch (error) {
      if (error instanceof ProblemError && error.problem.status === 404) return null;
      throw error;
    }
  },
  staleTime: Number.POSITIVE_INFINITY,
});

/** What the sign-in page itself shows. */
const KEPT_AT_SIGN_IN = new Set<unknown>([meQuery.queryKey[0], demoQuery.queryKey[0]]);

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: SignIn) => callApi("/auth/sign-in", { method: "POST", body: input, schema: null }),
    onSuccess: () => {
      // Whoever was signed in before may have been somebody else: nothing of theirs stays.
      client.removeQueries({ predicate: ({ queryKey }) => !KEPT_AT_SIGN_IN.has(queryKey[0]) });
      return client.fetchQuery({ ...meQuery, staleTime: 0 });
    },
  });
}
