import type { ComponentType } from "react";
import { createBrowserRouter, type RouteObject } from "react-router-dom";
import { NotFoundPage } from "./features/shell/not-found-page";
import { RouteError } from "./features/shell/route-error";
import { Frame, SignedInFrame } from "./features/shell/shell";

/** A page in a bundle of its own, fetched when its address is first opened. */
function lazyPage(load: () => Promise<ComponentType>): Pick<RouteObject, "lazy"> {
  return { lazy: async () => ({ Component: await load() }) };
}

/** Nothing is drawn until the first page's bundle is there: a flash of an empty frame helps nobody. */
const nothingYet = <></>;

/** Every address of the product. */
export function createRouter() {
  return createBrowserRouter([
    {
      element: <SignedInFrame />,
      errorElement: <RouteError />,
      hydrateFallbackElement: nothingYet,
      children: [
        { path: "/", ...lazyPage(async () => (await import("./features/home/home-page")).HomePage) },
        {
          path: "/briefs",
          ...lazyPage(async () => (await import("./features/briefs/briefs-page")).BriefsPage),
        },
        {
          path: "/briefs/new",
          ...lazyPage(async () => (await import("./features/briefs/new-brief-page")).NewBriefPage),
        },
        {
          path: "/briefs/:id",
          ...lazyPage(async () => (await import("./features/briefs/brief-page")).BriefPage),
        },
        {
          path: "/stages",
          ...lazyPage(async () => (await import("./features/stages/stages-page")).StagesPage),
        },
        {
          path: "/stages/new",
          ...lazyPage(async () => (await import("./features/stages/new-stage-page")).NewStagePage),
        },
        {
          path: "/stages/:id",
          ...lazyPage(async () => (await import("./features/stages/stage-page")).StagePage),
        },
      ],
    },
    {
      element: <Frame />,
      errorElement: <RouteError />,
      hydrateFallbackElement: nothingYet,
      children: [
        {
          path: "/method",
          ...lazyPage(async () => (await import("./features/method/method-page")).MethodPage),
        },
        {
          path: "/sign-in",
          ...lazyPage(async () => (await import("./features/identity/sign-in-page")).SignInPage),
        },
        { path: "*", element: <NotFoundPage /> },
      ],
    },
  ]);
}
