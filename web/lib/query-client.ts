import { QueryCache, QueryClient } from "@tanstack/react-query";
import { ProblemError } from "./api";
import { meQuery } from "./session";

const statusOf = (error: unknown) => (error instanceof ProblemError ? error.problem.status : null);

/** The page's cache of the server's answers. */
export function createQueryClient(): QueryClient {
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({
      // The session ended meanwhile: the frame sends to the sign-in page and back. A refused change is only told, so
      // that what was typed stays in sight.
      onError: (error) => {
        if (statusOf(error) === 401) client.setQueryData(meQuery.queryKey, null);
      },
    }),
    defaultOptions: {
      // Offline, an answer that says so is worth more than one that waits in silence.
      mutations: { networkMode: "always" },
      queries: {
        networkMode: "always",
        // A refusal stays a refusal; only a server that wasn't reached is worth another try.
        retry: (failures, error) => failures < 2 && statusOf(error) === 0,
      },
    },
  });
  return client;
}
