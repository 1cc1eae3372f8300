import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { NewBriefPage } from "../../../web/features/briefs/new-brief-page";
import { buildAnswer, buildFit, fill, playRanking } from "../support/briefs";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

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
