import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, configure, render } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { type ReactNode, Suspense } from "react";
import { createMemoryRouter, type RouteObject, RouterProvider } from "react-router-dom";
import { afterEach } from "vitest";
import { Toaster } from "../../../web/ui/toast";
import { ResistanceStyleProvider } from "../../../web/ui/value";

// A busy machine needs longer than the library's second.
configure({ asyncUtilTimeout: 6000 });
afterEach(cleanup);

/**
 * Shows a page as the product would, at an address.
 *
 * @param pages what stands at which path
 */
export function renderAt(address: string, pages: Record<string, ReactNode>) {
  const routes = Object.entries(pages).map(([path, page]) => ({
    path,
    element: (
      <ResistanceStyleProvider value="rkm">
        <Suspense fallback="Loading">{page}</Suspense>
        <Toaster />
      </ResistanceStyleProvider>
    ),
  }));
  return renderRoutes(address, routes, new QueryClient({ defaultOptions: { queries: { retry: false } } }));
}

/** Shows routes with the frame that they bring themselves. */
export function renderRoutes(address: string, routes: RouteObject[], client: QueryClient) {
  const router = createMemoryRouter(routes, { initialEntries: [address] });
  render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { router, user: userEvent.setup() };
}
