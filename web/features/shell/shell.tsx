import { useQuery } from "@tanstack/react-query";
import { type ReactNode, Suspense, useEffect, useRef } from "react";
import { Navigate, Outlet, ScrollRestoration, useLocation, useNavigation } from "react-router-dom";
import { problemOf } from "../../lib/api";
import { usePreferences } from "../../lib/preferences";
import { meQuery } from "../../lib/session";
import { ProblemMessage } from "../../ui/problem-message";
import { SkeletonRows } from "../../ui/skeleton";
import { Toaster } from "../../ui/toast";
import { ResistanceStyleProvider } from "../../ui/value";
import { TopBar } from "./top-bar";

/** The page around a page, for whoever comes. */
export function Frame() {
  const { data: me } = useQuery(meQuery);
  return (
    <PageFrame top={<TopBar me={me ?? null} />}>
      <Outlet />
    </PageFrame>
  );
}

/** The page around a page for somebody signed in; others sign in first and come back. */
export function SignedInFrame() {
  const { data: me, isPending, error, refetch, isFetching } = useQuery(meQuery);
  const { pathname, search } = useLocation();
  if (me === null) {
    return <Navigate to={`/sign-in?${new URLSearchParams({ to: pathname + search })}`} replace />;
  }
  return (
    <PageFrame top={<TopBar me={me ?? null} />}>
      {isPending && <SkeletonRows rows={4} label="The page is being fetched" />}
      {error && <ProblemMessage problem={problemOf(error)} onRetry={refetch} retrying={isFetching} />}
      {/* Another team's page starts afresh: nothing it held may show. */}
      {me && (
        <Suspense key={me.team.id} fallback={<SkeletonRows rows={4} label="The page is being fetched" />}>
          <Outlet />
        </Suspense>
      )}
    </PageFrame>
  );
}

function PageFrame({ top, children }: { top: ReactNode; children: ReactNode }) {
  const { resistances } = usePreferences();
  const navigation = useNavigation();
  const main = useFocusOnArrival();
  return (
    <ResistanceStyleProvider value={resistances}>
      <a
        href="#main"
        className="sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-50 focus:bg-paper focus:p-2"
      >
        Skip to the page
      </a>
      {top}
      <main
        id="main"
        ref={main}
        tabIndex={-1}
        aria-busy={navigation.state === "loading" || undefined}
        className="page pt-7 pb-20 outline-none print:p-0"
      >
        {children}
      </main>
      <Toaster />
      <ScrollRestoration />
    </ResistanceStyleProvider>
  );
}

/** Puts the focus on a page when one arrives at it, so that the keyboard and a screen reader go on from there. */
function useFocusOnArrival() {
  const main = useRef<HTMLElement>(null);
  const { pathname, hash } = useLocation();
  const arrivedAt = useRef(pathname);
  useEffect(() => {
    if (arrivedAt.current === pathname) return;
    arrivedAt.current = pathname;
    if (!hash) main.current?.focus({ preventScroll: true });
  }, [pathname, hash]);
  return main;
}
