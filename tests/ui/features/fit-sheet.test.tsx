import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import type { KeepStage } from "#shared/schemas/stage";
import { NewStagePage } from "../../../web/features/stages/new-stage-page";
import { stageLink } from "../../../web/lib/stage-link";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";
import { BRIEF, buildStage, figure, PAGES, PART, playStage, RESISTORS, step, YIELD } from "../support/stages";

playServer();

describe("a fit that isn't kept", () => {
  const address = stageLink({
    partId: 1,
    resistors: RESISTORS,
    brief: BRIEF,
    briefId: null,
    place: 2,
  });
  const pages = { "/stages/new": <NewStagePage />, ...PAGES };

  function playFit(): KeepStage[] {
    const kept: KeepStage[] = [];
    server.use(
      http.get(`${API}/parts/1`, () => HttpResponse.json(PART)),
      http.get(`${API}/briefs`, () => HttpResponse.json({ items: [] })),
      http.post(`${API}/fits/yield`, () => HttpResponse.json({ yields: [YIELD.yield] })),
      http.post(`${API}/stages`, async ({ request }) => {
        const input = (await request.json()) as KeepStage;
        kept.push(input);
        return HttpResponse.json(buildStage({ name: input.name }), { status: 201 });
      }),
    );
    return kept;
  }

  it("has the same sheet, and stepping it moves the address along", async () => {
    signedInAs("viewer");
    playFit();
    const { user, router } = renderAt(address, pages);
    expect(await figure("Drain current")).toBe("1.62 mA");
    await step(user, "R2", "higher");
    expect(await figure("Drain current")).toBe("1.79 mA");
    const search = new URLSearchParams(router.state.location.search);
    expect([search.get("r2"), search.get("fit")]).toEqual(["820000", null]);
    expect(screen.queryByRole("button", { name: /keep/i })).toBeNull();
  });

  it("is kept with the values as stepped and the brief it was ranked for", async () => {
    signedInAs("designer");
    playStage();
    const kept = playFit();
    const { user, router } = renderAt(address, pages);
    await step(user, "R2", "higher");
    await user.click(screen.getByRole("button", { name: "Keep this stage" }));
    const dialog = await screen.findByRole("dialog");
    const name = within(dialog).getByLabelText("Name");
    await user.clear(name);
    await user.click(within(dialog).getByRole("button", { name: "Keep it" }));
    expect(await within(dialog).findByText("Give the stage a name")).toBeTruthy();
    await user.type(name, "Board A");
    await user.click(within(dialog).getByRole("button", { name: "Keep it" }));
    await waitFor(() => expect(router.state.location.pathname).toBe("/stages/4"));
    expect(kept).toEqual([
      {
        name: "Board A",
        note: "",
        partId: 1,
        resistors: { ...RESISTORS, r2: 820e3 },
        brief: BRIEF,
        briefId: null,
      },
    ]);
  });

  it("says so when the address holds none", async () => {
    signedInAs("designer");
    renderAt("/stages/new?part=1&r1=many", pages);
    expect(await screen.findByText("This address doesn't hold a fit.")).toBeTruthy();
  });
});
