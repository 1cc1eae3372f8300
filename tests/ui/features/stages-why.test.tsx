import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { describeStage } from "#shared/bias/stage-sheet";
import type { StageYieldRequest } from "#shared/schemas/yield";
import { formatQuantity } from "#shared/values/engineering";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";
import { BRIEF, buildStage, PAGES, PART, playStage, RESISTORS, shown, step, YIELD } from "../support/stages";

playServer();

describe("a stage's sheet", () => {
  it("says what every board still has, and which boards set it", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    const { assured } = describeStage(PART, BRIEF, RESISTORS);
    const { symmetric } = assured.swing;
    expect(symmetric).toBeGreaterThan(0);
    const verdict = (await screen.findByText(/both ways/)).textContent;
    expect(verdict).toContain(`Every board: ${formatQuantity(symmetric, "V")}.`);
    // The least room is toward cutoff: the highest threshold, the lowest rail.
    expect(verdict).toMatch(/What binds: room toward cutoff, on (cold|hot) boards with a high threshold\./);
    const boards = screen.getByRole("table", { name: /^Which boards/ });
    const cells = (name: RegExp) =>
      within(within(boards).getByRole("row", { name }))
        .getAllByRole("cell")
        .map((cell) => cell.textContent);
    expect(cells(/^threshold/)).toEqual(["0.800 V", "1.80 V"]);
    expect(cells(/^rail/)[1]).toBe("11.4 V");
    expect(cells(/^least room/)[1]).toBe(formatQuantity(assured.swing.towardCutoff, "V"));
  });

  it("says in words that some builds leave saturation", async () => {
    signedInAs("designer");
    playStage(buildStage({ resistors: { ...RESISTORS, rd: 4700 } }));
    renderAt("/stages/4", PAGES);
    const verdict = (await screen.findByText(/both ways/)).textContent;
    expect(verdict).toMatch(/Some builds leave saturation\. What binds: room toward the ohmic region/);
    expect(screen.getByRole("img", { name: /No swing is assured for every build/ })).toBeTruthy();
  });

  it("draws the assured part of its balance", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    expect(await screen.findByRole("img", { name: /Every build has [\d.]+ V and [\d.]+ V/ })).toBeTruthy();
  });

  it("names the limit that binds and what it has to spare", async () => {
    signedInAs("designer");
    playStage(buildStage({ brief: { ...BRIEF, supplyCurrent: { max: 1.7e-3 } } }));
    renderAt("/stages/4", PAGES);
    const why = await screen.findByRole("region", { name: "Why" });
    // 1.62 mA of 1.7 mA: about a twentieth is left.
    expect(why.textContent).toMatch(
      /The limit that binds: supply current, 1\.62 mA, 4\.\d % inside the 1\.7 mA allowed\./,
    );
    const table = within(why).getByRole("table", { name: "Margin to each limit" });
    const [, first] = within(table).getAllByRole("row");
    expect(first.textContent).toMatch(/^supply current≤ 1\.7 mA1\.62 mA\+4\.\d %$/);
  });

  it("says of a limit that it is past, and of the assured swing that it is not required", async () => {
    signedInAs("designer");
    playStage(buildStage({ brief: { ...BRIEF, swing: { peak: 3 }, gain: { min: 50 } } }));
    renderAt("/stages/4", PAGES);
    const why = await screen.findByRole("region", { name: "Why" });
    expect(why.textContent).toMatch(/Past its limit: gain, .+ past the 50 asked for\./);
    expect(
      within(why).getByRole("row", { name: /^assured swing \(not required\) ≥ 3 V .+ −\d+ %$/ }),
    ).toBeTruthy();
    expect(screen.getAllByText("Misses the brief.").length).toBe(1);
  });

  it("shows what one per cent more of a component does, as solving it anew would", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    const table = await screen.findByRole("table", { name: /^What \+1 %/ });
    const row = within(table).getByRole("row", { name: /^RD/ });
    const at = (rd: number) => describeStage(PART, BRIEF, { ...RESISTORS, rd }).bias;
    const [more, less] = [at(2713.5), at(2686.5)];
    const volts = (more.swing?.symmetric ?? 0) - (less.swing?.symmetric ?? 0);
    const points = 100 * ((more.centringError ?? 0) - (less.centringError ?? 0));
    expect(row.textContent).toContain(`+${formatQuantity(volts, "V", { digits: 2 })}`);
    expect(row.textContent).toContain(points.toFixed(2).replace("-", "−"));
  });

  it("offers better values that behave like steps: the sheet follows, and so does the address", async () => {
    signedInAs("viewer");
    playStage();
    const { user, router } = renderAt("/stages/4", PAGES);
    const table = await screen.findByRole("table", { name: "Better with one value changed" });
    const [, , first] = within(table).getAllByRole("row");
    const [, promised, assured] = within(first)
      .getAllByRole("cell")
      .map((cell) => cell.textContent);
    const offer = within(first).getByRole("button");
    const [, name, marking] = offer.getAttribute("aria-label")?.match(/^Try (R\w+) (\S+)$/) ?? [];
    await user.click(offer);
    expect(shown(name)).toBe(marking);
    expect(screen.getByText(/both ways/).textContent).toContain(`${promised} off centre`);
    expect(screen.getByText(/both ways/).textContent).toContain(`Every board: ${assured}`);
    expect(router.state.location.search).toMatch(new RegExp(`^\\?${name.toLowerCase()}=\\d+$`));
    expect(screen.getByText(/Changed from what is kept/)).toBeTruthy();
    // What was clicked is gone; the keyboard goes on from there all the same.
    expect(
      document.activeElement?.contains(screen.getByRole("table", { name: "Better with one value changed" })),
    ).toBe(true);
    expect(document.activeElement).not.toBe(document.body);
  });
});

describe("the yield on a stage's sheet", () => {
  it("stands with its interval and what costs the most of it", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    expect(await screen.findByText("95.7 %")).toBeTruthy();
    expect(screen.getByText("95 % interval 95.4 % to 96.0 %")).toBeTruthy();
    expect(
      screen.getByText(
        "Most of the loss comes from the threshold: held at its typical value, 99.8 % would pass.",
      ),
    ).toBeTruthy();
  });

  it("doesn't blame one parameter for most of a loss that it isn't most of", async () => {
    signedInAs("designer");
    playStage();
    const costliest = { parameter: "k", fraction: 0.965 };
    server.use(http.post(`${API}/stages/4/yield`, () => HttpResponse.json({ ...YIELD, costliest })));
    renderAt("/stages/4", PAGES);
    expect(await screen.findByText(/^The largest part of the loss comes from the conduction/)).toBeTruthy();
  });

  it("is asked anew once for the values that stepping ends at, the old one marked meanwhile", async () => {
    signedInAs("designer");
    playStage();
    const asked = playYields();
    const { user } = renderAt("/stages/4", PAGES);
    await screen.findByText("90.0 %");
    await step(user, "R2", "higher");
    await step(user, "RD", "lower");
    expect(screen.getByText("before the last step")).toBeTruthy();
    expect(screen.getByText(/^90\.0 %/)).toBeTruthy();
    expect(await screen.findByText("50.0 %")).toBeTruthy();
    expect(screen.queryByText("before the last step")).toBeNull();
    expect(asked).toEqual([
      { resistors: RESISTORS, builds: 20_000, seed: 1 },
      { resistors: { ...RESISTORS, r2: 820e3, rd: 2400 }, builds: 20_000, seed: 1 },
    ]);
  });

  it("that can't be had says why, and can be asked for again", async () => {
    signedInAs("designer");
    playStage();
    const problem = { type: "about:blank", title: "Too many at once", status: 429, code: "busy", errors: [] };
    server.use(
      http.post(`${API}/stages/4/yield`, () => HttpResponse.json(problem, { status: 429 }), { once: true }),
    );
    const { user } = renderAt("/stages/4", PAGES);
    expect(await screen.findByText("Too many at once.")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "try again" }));
    expect(await screen.findByText("95.7 %")).toBeTruthy();
  });

  /** Answers 90 % for the first yield asked for and 50 % for the next; keeps what was asked. */
  function playYields(): StageYieldRequest[] {
    const asked: StageYieldRequest[] = [];
    server.use(
      http.post(`${API}/stages/4/yield`, async ({ request }) => {
        asked.push((await request.json()) as StageYieldRequest);
        const fraction = asked.length === 1 ? 0.9 : 0.5;
        return HttpResponse.json({ ...YIELD, yield: { ...YIELD.yield, fraction } });
      }),
    );
    return asked;
  }
});
