import { focusManager } from "@tanstack/react-query";
import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { type Brief, briefSchema, type SavedBrief } from "#shared/schemas/brief";
import type { Fit, FitsRequest, FitsResponse } from "#shared/schemas/fits";
import { BriefPage } from "../../../web/features/briefs/brief-page";
import { BriefsPage } from "../../../web/features/briefs/briefs-page";
import { NewBriefPage } from "../../../web/features/briefs/new-brief-page";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

const BRIEF = briefSchema.parse({ rail: { volts: 12 }, load: { ohms: 10e3 }, swing: { peak: 1.5 } });

function buildSaved(overrides: Partial<SavedBrief> = {}): SavedBrief {
  const someone = { id: "u1", name: "S. Omeone" };
  return {
    id: 7,
    name: "First stage",
    version: 3,
    brief: BRIEF,
    createdBy: someone,
    updatedBy: someone,
    createdAt: "2026-11-02T09:00:00.000Z",
    updatedAt: "2026-11-03T09:00:00.000Z",
    ...overrides,
  };
}

function buildFit(id: number, partNumber: string, symmetric: number): Fit {
  return {
    part: {
      id,
      partNumber,
      maker: "Test Row",
      polarity: "n",
      package: "SOT-23",
      mounting: "surface",
      lifecycle: "active",
      stock: 1200,
      unitPrice: 11,
    },
    r1: 1.8e6,
    r2: 750e3,
    rd: 2700,
    rs: 1200,
    bias: {
      region: "saturation",
      vg: 3.53,
      vgs: 1.26,
      overdrive: 0.36,
      id: 1.89e-3,
      vds: 4.62,
      transition: { id: 3.8e-3, vds: 0.52 },
      swing: { towardCutoff: symmetric, towardOhmic: symmetric + 0.1, symmetric },
      centringError: 0.012,
      gm: 10e-3,
      ro: 50e3,
      gain: -21.9,
      inputResistance: 529e3,
      outputResistance: 2600,
      power: 8.7e-3,
    },
    supplyCurrent: 1.9e-3,
    highCorner: 2e6,
    distortion: null,
    assured: null,
    cost: null,
    cautions: [],
  };
}

function buildAnswer(overrides: Partial<FitsResponse> = {}): FitsResponse {
  return {
    fits: [buildFit(1, "AAA-1", 4.02), buildFit(2, "BBB-2", 3.5)],
    considered: 35_437_621_248,
    partsThatFit: 2,
    complete: true,
    passedOver: [{ reason: "swing", parts: 331, message: "No resistors give 1.5 V peak both ways." }],
    relax: null,
    elapsedMs: 90,
    ...overrides,
  };
}

/** Answers each ranking as lines: progress, then the result; keeps what was asked. */
function playRanking(...answers: FitsResponse[]): FitsRequest[] {
  const asked: FitsRequest[] = [];
  server.use(
    http.post(`${API}/fits`, async ({ request }) => {
      asked.push((await request.json()) as FitsRequest);
      const result = answers[Math.min(asked.length, answers.length) - 1];
      if (!request.headers.get("accept")?.includes("ndjson")) return HttpResponse.json(result);
      const lines = [{ progress: { partsDone: 10, partsTotal: 333 } }, { result }];
      return new HttpResponse(lines.map((line) => `${JSON.stringify(line)}\n`).join(""), {
        headers: { "content-type": "application/x-ndjson" },
      });
    }),
  );
  return asked;
}

async function fill(user: ReturnType<typeof renderAt>["user"], label: string, text: string) {
  const blank = await screen.findByRole("textbox", { name: label });
  await user.clear(blank);
  await user.type(blank, `${text}{Tab}`);
}

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

describe("the ranking", () => {
  it("puts the brief into the address, so that it can be shared", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    const { user, router } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await fill(user, "Swing", "2 V");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await screen.findByText(/combinations ranked in/);
    const shared = router.state.location.search;
    const asked = playRanking(buildAnswer());
    renderAt(`/briefs/new${shared}`, { "/briefs/new": <NewBriefPage /> });
    await waitFor(() => expect(asked[0]?.brief.swing.peak).toBe(2));
  });

  it("says how many combinations there were, how many parts fit, and why others were passed over", async () => {
    signedInAs("designer");
    playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new?b={}", { "/briefs/new": <NewBriefPage /> });
    expect(await screen.findByText("35,437,621,248")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "331 passed over, and why" }));
    const dialog = await screen.findByRole("dialog");
    expect(within(dialog).getByText("No resistors give 1.5 V peak both ways.")).toBeTruthy();
  });

  it("shows progress and can be cancelled", async () => {
    signedInAs("designer");
    let closed = false;
    server.use(
      http.post(`${API}/fits`, ({ request }) => {
        const body = new ReadableStream({
          start(controller) {
            const line = `${JSON.stringify({ progress: { partsDone: 120, partsTotal: 1260 } })}\n`;
            controller.enqueue(new TextEncoder().encode(line));
            request.signal.addEventListener("abort", () => {
              closed = true;
            });
          },
        });
        return new HttpResponse(body, { headers: { "content-type": "application/x-ndjson" } });
      }),
    );
    const { user } = renderAt("/briefs/new?b={}", { "/briefs/new": <NewBriefPage /> });
    expect(await screen.findByText("Ranking: 120 of 1,260 parts")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Cancel" }));
    expect(await screen.findByText("Ranking was cancelled.")).toBeTruthy();
    await waitFor(() => expect(closed).toBe(true));
    playRanking(buildAnswer());
    await user.click(screen.getByRole("button", { name: "Rank again" }));
    expect(await screen.findByText("35,437,621,248")).toBeTruthy();
  });

  it("that was cancelled ranks again once the brief has changed", async () => {
    signedInAs("designer");
    server.use(http.post(`${API}/fits`, () => new Promise<Response>(() => {})));
    const { user } = renderAt("/briefs/new?b={}", { "/briefs/new": <NewBriefPage /> });
    await user.click(await screen.findByRole("button", { name: "Cancel" }));
    expect(await screen.findByText("Ranking was cancelled.")).toBeTruthy();
    playRanking(buildAnswer());
    await fill(user, "Swing", "2 V");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    expect(await screen.findByText("35,437,621,248")).toBeTruthy();
  });

  it("goes back with the browser to the brief before, in the sentence and in the list", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user, router } = renderAt("/briefs/new?b={}", { "/briefs/new": <NewBriefPage /> });
    await screen.findByText("35,437,621,248");
    await fill(user, "Swing", "2 V");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await waitFor(() => expect(asked.length).toBe(2));
    void router.navigate(-1);
    await waitFor(() =>
      expect(screen.getByRole<HTMLInputElement>("textbox", { name: "Swing" }).value).toBe("1 V"),
    );
    expect(screen.queryByText(/The brief has changed since/)).toBeNull();
  });

  it("says that the brief has changed since only when it has, in whatever order it was filled in", async () => {
    signedInAs("designer");
    const asked = playRanking(buildAnswer());
    const { user } = renderAt("/briefs/new", { "/briefs/new": <NewBriefPage /> });
    await user.click(await screen.findByRole("button", { name: "more conditions" }));
    await fill(user, "Greatest gain", "40");
    await fill(user, "Least gain", "4");
    await user.selectOptions(screen.getByRole("combobox", { name: "Mounting" }), "Surface mount");
    await user.click(screen.getByRole("button", { name: "Rank the fits" }));
    await screen.findByText("35,437,621,248");
    expect(asked[0].brief).toMatchObject({ gain: { min: 4, max: 40 }, parts: { mounting: "surface" } });
    expect(screen.queryByText(/The brief has changed since/)).toBeNull();
    await fill(user, "Least gain", "5");
    expect(await screen.findByText(/The brief has changed since/)).toBeTruthy();
  });

  it("relaxes the one condition that stands in the way, and ranks again", async () => {
    signedInAs("designer");
    const nothing = buildAnswer({
      fits: [],
      partsThatFit: 0,
      relax: {
        condition: "swing",
        path: "swing.peak",
        parts: 12,
        stated: 1,
        needed: 0.84,
        message: "Lower the swing from 1 V to 0.84 V; without it 12 parts would fit.",
      },
    });
    const asked = playRanking(nothing, buildAnswer());
    const { user } = renderAt("/briefs/new?b={}", { "/briefs/new": <NewBriefPage /> });
    expect(await screen.findByText(/Lower the swing from 1 V to 0.84 V/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Relax it and rank again" }));
    expect(await screen.findByText("AAA-1")).toBeTruthy();
    expect(asked[1].brief.swing.peak).toBe(0.84);
  });

  it("moves by keyboard, opens a part's other resistor sets, and opens a fit's sheet", async () => {
    signedInAs("viewer");
    const asked = playRanking(buildAnswer(), buildAnswer({ fits: [buildFit(1, "AAA-1", 3.9)] }));
    const { user, router } = renderAt("/briefs/new?b={}", {
      "/briefs/new": <NewBriefPage />,
      "/stages/new": <p>The sheet</p>,
    });
    const table = await screen.findByRole("treegrid", { name: "Ranked fits" });
    const rows = within(table).getAllByRole("row");
    rows[1].focus();
    await user.keyboard("{ArrowRight}");
    expect(await screen.findByRole("grid", { name: "Resistor sets of AAA-1" })).toBeTruthy();
    expect(asked[1]).toMatchObject({ distinct: "none", brief: { parts: { ids: [1] } } });
    rows[1].focus();
    await user.keyboard("{Enter}");
    expect(await screen.findByText("The sheet")).toBeTruthy();
    const search = new URLSearchParams(router.state.location.search);
    expect(Object.fromEntries(search)).toMatchObject({
      part: "1",
      r1: "1800000",
      r2: "750000",
      rd: "2700",
      rs: "1200",
      fit: "1",
    });
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
