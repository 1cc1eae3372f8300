import { onlineManager } from "@tanstack/react-query";
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { Link } from "react-router-dom";
import { describe, expect, it } from "vitest";
import type { DemoAccounts } from "#shared/schemas/identity";
import { BriefsPage } from "../../../web/features/briefs/briefs-page";
import { HomePage } from "../../../web/features/home/home-page";
import { SignInPage, safeReturn } from "../../../web/features/identity/sign-in-page";
import { Frame, SignedInFrame } from "../../../web/features/shell/shell";
import { createQueryClient } from "../../../web/lib/query-client";
import { renderRoutes } from "../support/render";
import { API, buildMe, playServer, server } from "../support/server";

playServer();

const refusal = (status: number, title: string, errors: { path: string; message: string }[] = []) =>
  HttpResponse.json({ type: "about:blank", title, status, code: "refused", errors }, { status });

const DEMO: DemoAccounts = {
  password: "known-to-all",
  accounts: [{ email: "designer@team.example", role: "designer", team: "The Team" }],
};

/** A server with one session: signing in opens it, signing out and `end` close it. */
function playSession({ demo = null as DemoAccounts | null, open = false } = {}) {
  const session = { open, demoAsked: false, end: () => {} };
  session.end = () => {
    session.open = false;
  };
  const behindSession = (answer: () => Response) => () =>
    session.open ? answer() : refusal(401, "Sign in first");
  server.use(
    http.get(
      `${API}/auth/me`,
      behindSession(() => HttpResponse.json(buildMe())),
    ),
    http.get(`${API}/auth/demo`, () => {
      session.demoAsked = true;
      return demo ? HttpResponse.json(demo) : refusal(404, "Not found");
    }),
    http.post(`${API}/auth/sign-in`, async ({ request }) => {
      const { password } = (await request.json()) as { password: string };
      if (password !== "known-to-all") return refusal(401, "E-mail or password is wrong");
      session.open = true;
      return HttpResponse.json(buildMe());
    }),
    http.post(`${API}/auth/sign-out`, () => {
      session.end();
      return new HttpResponse(null, { status: 204 });
    }),
    http.get(
      `${API}/briefs`,
      behindSession(() => HttpResponse.json({ items: [] })),
    ),
    http.get(
      `${API}/stages`,
      behindSession(() => HttpResponse.json({ items: [] })),
    ),
  );
  return session;
}

function renderProduct(address: string) {
  const { router, user } = renderRoutes(
    address,
    [
      {
        element: <SignedInFrame />,
        children: [
          { path: "/", element: <HomePage /> },
          { path: "/briefs", element: <BriefsPage /> },
          { path: "/quiet", element: <Link to="/briefs?x=1">Go on</Link> },
        ],
      },
      { element: <Frame />, children: [{ path: "/sign-in", element: <SignInPage /> }] },
    ],
    createQueryClient(),
  );
  return { where: () => router.state.location.pathname + router.state.location.search, user };
}

async function signIn(user: ReturnType<typeof renderProduct>["user"], password: string) {
  await user.type(await screen.findByLabelText("E-mail"), "someone@team.example");
  await user.type(screen.getByLabelText("Password"), `${password}{Enter}`);
}

describe("a session", () => {
  it("is asked for first, and signing in goes on to the page that was wanted", async () => {
    playSession();
    const { where, user } = renderProduct("/briefs?x=1");
    await signIn(user, "known-to-all");
    expect(await screen.findByRole("heading", { name: "Briefs" })).toBeTruthy();
    expect(where()).toBe("/briefs?x=1");
  });

  it("that ends meanwhile sends to the sign-in page, and back to where one was going", async () => {
    const session = playSession({ open: true });
    const { where, user } = renderProduct("/quiet");
    const goOn = await screen.findByRole("link", { name: "Go on" });
    session.end();
    await user.click(goOn);
    await signIn(user, "known-to-all");
    expect(await screen.findByRole("heading", { name: "Briefs" })).toBeTruthy();
    expect(where()).toBe("/briefs?x=1");
  });

  it("is not opened by a wrong password, and the page says so", async () => {
    playSession();
    const { where, user } = renderProduct("/sign-in");
    await signIn(user, "a guess");
    expect(await screen.findByText("E-mail or password is wrong")).toBeTruthy();
    expect(where()).toBe("/sign-in");
  });

  it("ends by the menu under one's name", async () => {
    playSession({ open: true });
    const { where, user } = renderProduct("/");
    await user.click(await screen.findByRole("button", { name: /S. Omeone, The Team/ }));
    await user.click(await screen.findByRole("menuitem", { name: "Sign out" }));
    expect(await screen.findByRole("heading", { name: "Sign in" })).toBeTruthy();
    expect(where()).toBe("/sign-in");
  });
});

describe("the sign-in page", () => {
  it("signs in as a person of the demo at one press, where a demo runs", async () => {
    playSession({ demo: DEMO });
    const { user } = renderProduct("/sign-in");
    await user.click(await screen.findByRole("button", { name: /designer@team.example/ }));
    expect(await screen.findByRole("heading", { name: "The Team" })).toBeTruthy();
  });

  it("lists nobody where no demo runs", async () => {
    const session = playSession();
    renderProduct("/sign-in");
    await screen.findByLabelText("E-mail");
    await waitFor(() => expect(session.demoAsked).toBe(true));
    expect(screen.queryByText(/demo/i)).toBeNull();
  });

  it("asks for what is missing before it asks the server", async () => {
    playSession();
    const { user } = renderProduct("/sign-in");
    await user.click(await screen.findByRole("button", { name: "Sign in" }));
    expect(await screen.findByText("Write an e-mail address")).toBeTruthy();
    expect(screen.getByText("Write your password")).toBeTruthy();
  });

  it("returns to an address of this product and to no other", () => {
    expect(safeReturn("/stages?x=1")).toBe("/stages?x=1");
    for (const elsewhere of [
      "//elsewhere.example",
      "/\\elsewhere.example",
      "https://elsewhere.example",
      null,
    ]) {
      expect(safeReturn(elsewhere)).toBe("/");
    }
  });
});

describe("the home page", () => {
  it("says that the server can't be reached while the browser is offline, and tries again when asked", async () => {
    playSession({ open: true });
    const { user } = renderProduct("/");
    await screen.findByText("No brief yet.");
    cleanup();

    onlineManager.setOnline(false);
    server.use(http.get(`${API}/briefs`, () => HttpResponse.error()));
    renderProduct("/");
    expect(await screen.findByText("The server can't be reached")).toBeTruthy();
    onlineManager.setOnline(true);
    playSession({ open: true });
    await user.click(screen.getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("No brief yet.")).toBeTruthy();
  });

  it("offers the first step while there is nothing yet", async () => {
    playSession({ open: true });
    renderProduct("/");
    expect(await screen.findByText("No brief yet.")).toBeTruthy();
    expect(screen.getByText("No stage kept yet.")).toBeTruthy();
    const nav = screen.getByRole("navigation", { name: "Pages" });
    const pages = within(nav)
      .getAllByRole("link")
      .map((link) => link.textContent);
    expect(pages).toEqual(["Briefs", "Stages", "Method"]);
  });
});
