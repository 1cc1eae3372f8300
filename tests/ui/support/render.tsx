import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { type ReactNode, Suspense } from "react";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { afterEach } from "vitest";
import { Toaster } from "../../../web/ui/toast";
import { ResistanceStyleProvider } from "../../../web/ui/value";

afterEach(cleanup);

/**
 * Shows a page as the product would, at an address.
 *
 * @param pages what stands at which path
 */
export function renderAt(address: string, pages: Record<string, ReactNode>) {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createMemoryRouter(
    Object.entries(pages).map(([path, page]) => ({
      path,
      element: (
        <ResistanceStyleProvider value="rkm">
          <Suspense fallback="Loading">{page}</Suspense>
          <Toaster />
        </ResistanceStyleProvider>
      ),
    })),
    { initialEntries: [address] },
  );
  render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { router, user: userEvent.setup() };
}
