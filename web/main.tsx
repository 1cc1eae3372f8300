import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { RouterProvider } from "react-router-dom";
import { ProblemError } from "./lib/api";
import { applyTheme } from "./lib/preferences";
import { createRouter } from "./routes";
import "./theme.css";

const client = new QueryClient({
  defaultOptions: {
    queries: {
      // A refusal stays a refusal; only a server that wasn't reached is worth another try.
      retry: (failures, error) => failures < 2 && error instanceof ProblemError && error.problem.status === 0,
    },
  },
});

applyTheme();
const root = document.getElementById("root");
if (root) {
  createRoot(root).render(
    <StrictMode>
      <QueryClientProvider client={client}>
        <RouterProvider router={createRouter()} />
      </QueryClientProvider>
    </StrictMode>,
  );
}
