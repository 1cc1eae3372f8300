import { focusManager } from "@tanstack/react-query";
import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import type { Brief } from "#shared/schemas/brief";
import { BriefPage } from "../../../web/features/briefs/brief-page";
import { BriefsPage } from "../../../web/features/briefs/briefs-page";
import { NewBriefPage } from "../../../web/features/briefs/new-brief-page";
import { BRIEF, buildAnswer, buildSaved, fill, playRanking } from "../support/briefs";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

describe("the sentence brief", () => {
  it("reads units as they are typed, and sends SI values", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await fill(user, "Rail", "24V");
    await fill(user, "Load", "4k7");
    await fill(user, "Rail tolerance", "10 %");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await screen.findByText(/combinations ranked in/);
    expect(asked[0].brief.rail).toEqual({ volts: 24, tolerance: 0.1 });
    expect(asked[0].brief.load.ohms).toBe(4700);
  });

  it("names the field under the sentence and ranks nothing while a value is out of range or can't be read", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await fill(user, "Rail", "600 V");
    expect(await screen.findByText("Rail: Rails go from 0.5 V to 450 V")).toBeTruthy();
    await fill(user, "Rail", "some");
    expect(await screen.findByText(/^Rail: .*some/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    expect(asked).toEqual([]);
    await fill(user, "Rail", "9 V");
    await waitFor(() => expect(screen.queryByText(/^Rail: /)).toBeNull());
  });

  it("takes no load for an answer", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    const load = await screen.findByRole("textbox", { name: "Load" });
    await user.clear(load);
    await user.tab();
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await waitFor(() => expect(asked[0]?.brief.load.ohms).toBeNull());
  });

  it("sets one series for all resistors", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await user.selectOptions(await screen.findByRole("combobox", { name: "Resistor series" }), "E96");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await waitFor(() => expect(asked.length).toBe(1));
    const { divider, drain, source } = asked[0].brief.resistors;
    expect([divider.series, drain.series, source.series]).toEqual(["E96", "E96", "E96"]);
  });

  it("opens the other conditions as a form and puts what is stated into words", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await user.click(await screen.findByRole("button", { name: "more conditions" }));
    await fill(user, "Least gain", "4");
    await fill(user, "Input resistance, at least", "220k");
    expect(await screen.findByText("gain at least 4")).toBeTruthy();
    expect(screen.getByText("input at least 220 kΩ")).toBeTruthy();
  });
});

describe("a saved brief", () => {
  const pages = { "/briefs/:id": <BriefPage />, "/elsewhere": <p>Elsewhere</p> };

  it("is ranked as it opens, and a change of it is saved as the next version", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    let sent: { version: number; brief: Brief } | null = null;
    server.use(
      http.get(`${API}/briefs/7`, () => HttpResponse.json(buildSaved())),
      http.get(`${API}/briefs`, () => HttpResponse.json({ items: [] })),
      http.put(`${API}/briefs/7`, async ({ request }) => {
        sent = (await request.json()) as typeof sent;
        return HttpResponse.json(buildSaved({ version: 4, brief: sent?.brief ?? BRIEF }));
      }),
    );
    const { user } = renderAt("/briefs/7", pages);
    expect(await screen.findByText("35,437,621,248")).toBeTruthy();
    expect(screen.getByText("version 3 · saved")).toBeTruthy();
    await fill(user, "Swing", "2 V");
    await user.click(await screen.findByRole("button", { name: "Save version 4" }));
    expect(await screen.findByText("version 4 · saved")).toBeTruthy();
    expect(sent).toMatchObject({ version: 3, brief: { swing: { peak: 2 } } });
  });

  it("that changed meanwhile is refused with what changed, and mine can be kept as a copy", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    const theirs = buildSaved({ version: 4, brief: { ...BRIEF, swing: { peak: 3 } } });
    let copy: { name: string; brief: Brief } | null = null;
    server.use(
      http.get(`${API}/briefs/7`, () => HttpResponse.json(buildSaved())),
      http.get(`${API}/briefs/8`, () => HttpResponse.json(buildSaved({ id: 8 }))),
      http.get(`${API}/briefs`, () => HttpResponse.json({ items: [] })),
      http.put(`${API}/briefs/7`, () =>
        HttpResponse.json(
          {
            type: "about:blank",
            title: "Changed meanwhile",
            status: 409,
            code: "brief.version_conflict",
            detail: "R. Other saved version 4 meanwhile.",
            errors: [{ path: "brief.swing.peak", message: "Is now 3" }],
            current: theirs,
          },
          { status: 409 },
        ),
      ),
      http.post(`${API}/briefs`, async ({ request }) => {
        copy = (await request.json()) as typeof copy;
        return HttpResponse.json(buildSaved({ id: 8, ...copy }), { status: 201 });
      }),
    );
    const { user, router } = renderAt("/briefs/7", pages);
    await fill(user, "Swing", "2 V");
    await user.click(await screen.findByRole("button", { name: "Save version 4" }));
    const dialog = await screen.findByRole("dialog");
    expect(within(dialog).getByText("R. Other saved version 4 meanwhile.")).toBeTruthy();
    expect(within(dialog).getByText("brief.swing.peak")).toBeTruthy();
    await user.click(within(dialog).getByRole("button", { name: "Save mine as a copy" }));
    await waitFor(() => expect(copy?.brief.swing.peak).toBe(2));
    expect(router.state.location.pathname).toBe("/briefs/7");
  });

  it("that somebody else saves meanwhile doesn't take away what was typed", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    let version = 3;
    server.use(http.get(`${API}/briefs/7`, () => HttpResponse.json(buildSaved({ version }))));
    const { user } = renderAt("/briefs/7", pages);
    await fill(user, "Swing", "2 V");
    version = 4;
    focusManager.setFocused(false);
    focusManager.setFocused(true);
    // Long enough a task for an answer to have come in.
    await fill(user, "Rail", "9 V");
    focusManager.setFocused(undefined);
    expect(screen.getByText("version 3 · changes not saved")).toBeTruthy();
    expect(screen.getByRole<HTMLInputElement>("textbox", { name: "Swing" }).value).toBe("2 V");
  });

  it("asks before changes are left behind", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    server.use(http.get(`${API}/briefs/7`, () => HttpResponse.json(buildSaved())));
    const { user, router } = renderAt("/briefs/7", pages);
    await fill(user, "Swing", "2 V");
    void router.navigate("/elsewhere");
    const dialog = await screen.findByRole("dialog", { name: "Leave without saving?" });
    await user.click(within(dialog).getByRole("button", { name: "Keep it" }));
    expect(router.state.location.pathname).toBe("/briefs/7");
    void router.navigate("/elsewhere");
    await user.click(await screen.findByRole("button", { name: "Leave" }));
    expect(await screen.findByText("Elsewhere")).toBeTruthy();
  });

  it("can be looked at and tried by a viewer, who is offered no saving", async () => {
    signedInAs("viewer");
    playRanking(buildAnswer());
    server.use(http.get(`${API}/briefs/7`, () => HttpResponse.json(buildSaved())));
    const { user } = renderAt("/briefs/7", pages);
    expect(await screen.findByText("AAA-1")).toBeTruthy();
    await fill(user, "Swing", "2 V");
    expect(screen.getByText("version 3 · changes not saved")).toBeTruthy();
    expect(screen.queryByRole("button", { name: /save|rename/i })).toBeNull();
  });
});

describe("the list of briefs", () => {
  it("says what goes there when it is empty, with the first step", async () => {
    signedInAs("designer");
    server.use(http.get(`${API}/briefs`, () => HttpResponse.json({ items: [] })));
    renderAt("/briefs", { "/briefs": <BriefsPage /> });
    expect(await screen.findByText("No brief yet.")).toBeTruthy();
    expect(screen.getAllByRole("link", { name: "Write a brief" })[0].getAttribute("href")).toBe(
      "/briefs/new",
    );
  });

  it("deletes with a way back", async () => {
    signedInAs("designer");
    const calls: string[] = [];
    let there = true;
    server.use(
      http.get(`${API}/briefs`, () => HttpResponse.json({ items: there ? [buildSaved()] : [] })),
      http.delete(`${API}/briefs/7`, () => {
        calls.push("delete");
        there = false;
        return new HttpResponse(null, { status: 204 });
      }),
      http.post(`${API}/briefs/7/restore`, () => {
        calls.push("restore");
        there = true;
        return HttpResponse.json(buildSaved());
      }),
    );
    const { user } = renderAt("/briefs", { "/briefs": <BriefsPage /> });
    await user.click(await screen.findByRole("button", { name: "Delete First stage" }));
    expect(await screen.findByText("No brief yet.")).toBeTruthy();
    await user.click(await screen.findByRole("button", { name: "Undo" }));
    expect(await screen.findByText("First stage")).toBeTruthy();
    expect(calls).toEqual(["delete", "restore"]);
  });

  it("says what went wrong and offers another try", async () => {
    signedInAs("designer");
    server.use(http.get(`${API}/briefs`, () => HttpResponse.error()));
    const { user } = renderAt("/briefs", { "/briefs": <BriefsPage /> });
    expect(await screen.findByText("The server can't be reached")).toBeTruthy();
    server.use(http.get(`${API}/briefs`, () => HttpResponse.json({ items: [buildSaved()] })));
    await user.click(screen.getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("First stage")).toBeTruthy();
  });
});
