import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import type { StageYieldRequest } from "#shared/schemas/yield";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";
import { BRIEF, buildStage, PAGES, playStage, RESISTORS, YIELD } from "../support/stages";

playServer();

describe("a stage's sheet", () => {
  it("says what every build still has, and which builds set it", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    expect(await screen.findByText(/no build inside the spread has less/)).toBeTruthy();
    expect(screen.getByText(/VT 1\.\d+ V, K .+, rail 11\.4 V/)).toBeTruthy();
  });

  it("says in words that some builds leave saturation", async () => {
    signedInAs("designer");
    playStage(buildStage({ resistors: { ...RESISTORS, rd: 4700 } }));
    renderAt("/stages/4", PAGES);
    expect(await screen.findByText(/some builds inside the spread leave saturation/)).toBeTruthy();
  });

  it("shows the yield with its interval and what costs the most of it", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    expect(await screen.findByText("95.7 %")).toBeTruthy();
    expect(
      screen.getByText(/95 % interval 95\.4 % to 96\.0 %.+The threshold costs the most.+99\.8 % would/),
    ).toBeTruthy();
  });

  it("asks for the yield of the values that are tried", async () => {
    signedInAs("designer");
    playStage();
    const asked: StageYieldRequest[] = [];
    server.use(
      http.post(`${API}/stages/4/yield`, async ({ request }) => {
        asked.push((await request.json()) as StageYieldRequest);
        return HttpResponse.json({
          ...YIELD,
          yield: { ...YIELD.yield, fraction: asked.length === 1 ? 0.9 : 0.5 },
        });
      }),
    );
    const { user } = renderAt("/stages/4", PAGES);
    await screen.findByText("90.0 %");
    const stepper = await screen.findByRole("group", { name: "R2" });
    await user.click(within(stepper).getAllByRole("button")[1]);
    expect(await screen.findByText("50.0 %")).toBeTruthy();
    expect(asked.at(-1)?.resistors?.r2).toBe(820e3);
  });

  it("names the limit that binds and what it has to spare", async () => {
    signedInAs("designer");
    playStage(buildStage({ brief: { ...BRIEF, supplyCurrent: { max: 1.7e-3 } } }));
    renderAt("/stages/4", PAGES);
    const why = await screen.findByRole("region", { name: "Why" });
    expect(within(why).getByText(/The limit that binds is the/).textContent).toMatch(
      /supply current: 1\.6\d mA/,
    );
    const row = within(why).getByRole("row", { name: /supply current/ });
    expect(row.textContent).toMatch(/≤ 1\.70 mA1\.6\d mA\d %/);
  });

  it("offers a better value, and trying it changes the sheet", async () => {
    signedInAs("designer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    const why = await screen.findByRole("region", { name: "Why" });
    const [better] = within(why).getAllByRole("button", { name: /off centre$/ });
    const promised = /([\d.]+ %) off centre$/.exec(better.textContent ?? "")?.[1] ?? "";
    await user.click(better);
    expect(await screen.findByText(/Changed from what is kept/)).toBeTruthy();
    expect(screen.getByText(/both ways/).textContent).toContain(promised);
  });
});
