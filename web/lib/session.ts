import { queryOptions, useMutation, useQuery, useQueryClient, useSuspenseQuery } from "@tanstack/react-query";
import { type Action, may } from "#shared/permissions";
import { type Me, meSchema } from "#shared/schemas/identity";
import { callApi, ProblemError } from "./api";

/** Who is signed in; null for nobody. */
export const meQuery = queryOptions({
  queryKey: ["me"],
  queryFn: async ({ signal }): Promise<Me | null> => {
    try {
      return await callApi("/auth/me", { schema: meSchema, signal });
    } catch (error) {
      if (error instanceof ProblemError && error.problem.status === 401) return null;
      throw error;
    }
  },
  staleTime: 60_000,
});

/** Who is signed in, where somebody must be: below the shell. */
export function useMe(): Me {
  const { data } = useSuspenseQuery(meQuery);
  if (!data) throw new Error("Nobody is signed in");
  return data;
}

/** Whether the person may do something in this team; the server decides, this only mirrors it. */
export function useMay(action: Action): boolean {
  const { data } = useQuery(meQuery);
  return data ? may(data.team.roles, action) : false;
}

/** Forgets everything that belonged to the last session. */
function useForgetSession(): () => void {
  const client = useQueryClient();
  return () => client.clear();
}

/** Ends the session. */
export function useSignOut() {
  const forget = useForgetSession();
  return useMutation({
    mutationFn: () => callApi("/auth/sign-out", { method: "POST", schema: null }),
    onSuccess: forget,
  });
}

/** Moves to another of one's teams; nothing of the old one stays in memory. */
export function useSwitchTeam() {
  const forget = useForgetSession();
  return useMutation({
    mutationFn: (teamId: number) => callApi("/auth/team", { method: "POST", body: { teamId }, schema: null }),
    onSuccess: forget,
  });
}
