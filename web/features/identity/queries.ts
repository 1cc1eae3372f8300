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

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: SignIn) => callApi("/auth/sign-in", { method: "POST", body: input, schema: null }),
    onSuccess: () => client.fetchQuery({ ...meQuery, staleTime: 0 }),
  });
}
