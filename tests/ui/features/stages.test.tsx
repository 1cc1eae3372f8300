import { screen, waitFor, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";
import {
  BRIEF,
  buildStage,
  figure,
  PAGES,
  PART,
  playStage,
  playStaleStage,
  RESISTORS,
  rename,
  shown,
  step,
} from "../support/stages";

playServer();

/**
 * Without channel-length modulation: with x the overdrive, VG - VT = x + RS K x², whose positive root gives ID = K x².
 */
function squareLawCurrent({ r1, r2, rs }: typeof RESISTORS): number {
  const [k, vt, vdd] = [10e-3, 1.2, 12];
  const room = (vdd * r2) / (r1 + r2) - vt;
  const overdrive = (Math.sqrt(1 + 4 * rs * k * room) - 1) / (2 * rs * k);
  return k * overdrive ** 2;
}

const inMilliamperes = (amperes: number) => `${(1e3 * amperes).toPrecision(3)} mA`;

// Expected Q-points: ID = K (VGS - VT)² (1 + λ VDS) with VT = 1.2 V, K = 10 mA/V², λ = 0.01, solved by bisection apart
// from the product's code.
describe("a stage's sheet", () => {
  it("moves the Q-point to where the quadratic puts it", async () => {
    signedInAs("viewer");
    playStage(buildStage({ part: { ...PART, lambda: 0 } }));
    const { user } = renderAt("/stages/4", PAGES);
    expect(await figure("Drain current")).toBe(inMilliamperes(squareLawCurrent(RESISTORS)));
    await step(user, "R2", "higher");
    const stepped = { ...RESISTORS, r2: 820e3 };
    const current = squareLawCurrent(stepped);
    expect(await figure("Drain current")).toBe(inMilliamperes(current));
    const vds = 12 - current * (stepped.rd + stepped.rs);
    expect(await figure("Drain-source voltage")).toBe(`${vds.toPrecision(3)} V`);
  });

  it("recalculates everything when a resistor is stepped in its series", async () => {
    signedInAs("designer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    expect(await figure("Drain current")).toBe("1.62 mA");
    expect(await figure("Drain-source voltage")).toBe("5.70 V");
    expect(await step(user, "R2", "higher")).toBe("820k");
    expect(await figure("Drain current")).toBe("1.79 mA");
    expect(await figure("Drain-source voltage")).toBe("5.03 V");
    expect(screen.getByText("Q 5.03 V, 1.79 mA")).toBeTruthy();
  });

  it("follows the ambient temperature", async () => {
    signedInAs("viewer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    const slider = await screen.findByRole("slider", { name: "Ambient" });
    slider.focus();
    await user.keyboard("{End}");
    expect(screen.getByText("At 50 °C")).toBeTruthy();
    // VT = 1.15 V, K = 10 mA/V² × (323.15/298.15)^-1.5.
    expect(await figure("Drain current")).toBe("1.63 mA");
  });

  it("says which values differ from those kept, and goes back to them", async () => {
    signedInAs("designer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    await step(user, "R2", "higher");
    await step(user, "RD", "lower");
    expect(screen.getByText(/R2 750k → 820k/)).toBeTruthy();
    expect(screen.getByText(/RD 2k7 → 2k4/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Back to the kept ones" }));
    expect(screen.queryByText(/750k → 820k/)).toBeNull();
    expect(await figure("Drain current")).toBe("1.62 mA");
  });

  it("keeps changed values as the next version, with name and note as they are", async () => {
    signedInAs("designer");
    const saved = playStage();
    const { user } = renderAt("/stages/4", PAGES);
    await step(user, "R2", "higher");
    await user.click(screen.getByRole("button", { name: "Keep these values" }));
    await waitFor(() => expect(screen.queryByText(/750k → 820k/)).toBeNull());
    expect(saved).toEqual([
      { name: "First stage", note: "Mind the cold.", resistors: { ...RESISTORS, r2: 820e3 }, version: 3 },
    ]);
    expect(await figure("Drain current")).toBe("1.79 mA");
  });

  it("tells which of the brief's conditions a stepped stage misses", async () => {
    signedInAs("viewer");
    playStage(buildStage({ brief: { ...BRIEF, supplyCurrent: { max: 1.7e-3 } } }));
    const { user } = renderAt("/stages/4", PAGES);
    await screen.findByRole("group", { name: "R2" });
    expect(screen.queryByText(/Misses the brief/)).toBeNull();
    await step(user, "R2", "higher");
    expect(screen.getByText(/supply current is 1.79 mA, above the 1.7 mA allowed/)).toBeTruthy();
  });

  it("shows its cautions, and nothing that would hide them", async () => {
    signedInAs("designer");
    playStage();
    renderAt("/stages/4", PAGES);
    const cautions = await screen.findByRole("region", { name: "Cautions" });
    expect(within(cautions).getByText(/Electrostatic discharge can damage the gate/)).toBeTruthy();
    expect(within(cautions).getByText(/verify on the bench/)).toBeTruthy();
    expect(within(cautions).queryByRole("button")).toBeNull();
  });

  it("gives the figure as a table too", async () => {
    signedInAs("viewer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    await user.click(await screen.findByRole("button", { name: "As a table" }));
    const row = screen.getByRole("row", { name: /^Q-point/ });
    expect(row.textContent).toContain("5.70 V");
  });

  it("can be looked at and tried by a viewer, who is offered no keeping, renaming or deleting", async () => {
    signedInAs("viewer");
    playStage();
    const { user } = renderAt("/stages/4", PAGES);
    expect(await step(user, "R2", "lower")).toBe("680k");
    expect(screen.getByRole("button", { name: "Back to the kept ones" })).toBeTruthy();
    expect(screen.queryByRole("button", { name: /keep|rename|delete/i })).toBeNull();
  });
});

describe("changing a kept stage", () => {
  it("renames it and notes something on it, and leaves its values alone", async () => {
    signedInAs("owner");
    const saved = playStage();
    const { user } = renderAt("/stages/4", PAGES);
    await user.click(await screen.findByRole("button", { name: /rename/ }));
    const dialog = await screen.findByRole("dialog");
    const name = within(dialog).getByLabelText("Name");
    await user.clear(name);
    await user.type(name, "Board A");
    await user.click(within(dialog).getByRole("button", { name: "Save" }));
    expect(await screen.findByRole("heading", { name: "Board A" })).toBeTruthy();
    expect(saved[0]).toMatchObject({ name: "Board A", note: "Mind the cold.", resistors: RESISTORS });
  });

  it("leaves stepped values on the screen while it is renamed", async () => {
    signedInAs("designer");
    const saved = playStage();
    const { user } = renderAt("/stages/4", PAGES);
    await step(user, "R2", "higher");
    await rename(user, "Board A");
    expect(await screen.findByRole("heading", { name: "Board A" })).toBeTruthy();
    expect(saved[0].resistors).toEqual(RESISTORS);
    expect(screen.getByText(/R2 750k → 820k/)).toBeTruthy();
  });

  it("that somebody else changed meanwhile is refused, and lays one's own values over the latest", async () => {
    signedInAs("designer");
    const saved = playStaleStage({ resistors: { ...RESISTORS, rd: 2400 } });
    const { user } = renderAt("/stages/4", PAGES);
    await step(user, "R2", "higher");
    await user.click(screen.getByRole("button", { name: "Keep these values" }));
    const dialog = await screen.findByRole("dialog");
    expect(within(dialog).getByText("R. Other changed this stage meanwhile.")).toBeTruthy();
    expect(within(dialog).getByText("2k7 → 2k4")).toBeTruthy();
    await user.click(within(dialog).getByRole("button", { name: "Load the latest" }));
    await waitFor(() => expect(shown("RD")).toBe("2k4"));
    expect(shown("R2")).toBe("820k");
    await user.click(screen.getByRole("button", { name: "Keep these values" }));
    await waitFor(() => expect(screen.queryByText(/750k → 820k/)).toBeNull());
    expect(saved.at(-1)).toMatchObject({ version: 4, resistors: { ...RESISTORS, r2: 820e3, rd: 2400 } });
  });

  it("that somebody else changed meanwhile keeps a typed note, and takes in what they changed", async () => {
    signedInAs("designer");
    const saved = playStaleStage({ name: "Their name" });
    const { user } = renderAt("/stages/4", PAGES);
    await user.click(await screen.findByRole("button", { name: /rename/ }));
    const note = within(await screen.findByRole("dialog")).getByLabelText("Note");
    await user.clear(note);
    await user.type(note, "Long thought about.");
    await user.click(screen.getByRole("button", { name: "Save" }));
    await screen.findByText("First stage → Their name");
    await user.click(screen.getByRole("button", { name: "Load the latest" }));
    expect(await screen.findByDisplayValue("Long thought about.")).toBeTruthy();
    expect(screen.getByDisplayValue("Their name")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Save" }));
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect(saved.at(-1)).toMatchObject({ version: 4, name: "Their name", note: "Long thought about." });
  });

  it("that is refused can be put off, and what was typed stays", async () => {
    signedInAs("designer");
    playStaleStage({ name: "Their name" });
    const { user } = renderAt("/stages/4", PAGES);
    await rename(user, "My name");
    await screen.findByText("First stage → Their name");
    await user.click(screen.getByRole("button", { name: "Not now" }));
    expect(await screen.findByDisplayValue("My name")).toBeTruthy();
  });

  it("deletes it with a way back", async () => {
    signedInAs("designer");
    playStage();
    const calls: string[] = [];
    let there = true;
    server.use(
      http.get(`${API}/stages`, () => HttpResponse.json({ items: there ? [buildStage()] : [] })),
      http.delete(`${API}/stages/4`, () => {
        calls.push("delete");
        there = false;
        return new HttpResponse(null, { status: 204 });
      }),
      http.post(`${API}/stages/4/restore`, () => {
        calls.push("restore");
        there = true;
        return HttpResponse.json(buildStage());
      }),
    );
    const { user } = renderAt("/stages/4", PAGES);
    await user.click(await screen.findByRole("button", { name: "delete" }));
    expect(await screen.findByText("No stage kept yet.")).toBeTruthy();
    await user.click(await screen.findByRole("button", { name: "Undo" }));
    expect(await screen.findByText("First stage")).toBeTruthy();
    expect(calls).toEqual(["delete", "restore"]);
  });
});

describe("the list of stages", () => {
  it("deletes a stage with a way back, for those who may", async () => {
    signedInAs("designer");
    const calls: string[] = [];
    const items = () => (calls.at(-1) === "delete" ? [] : [buildStage()]);
    server.use(
      http.get(`${API}/stages`, () => HttpResponse.json({ items: items() })),
      http.delete(`${API}/stages/4`, () => {
        calls.push("delete");
        return new HttpResponse(null, { status: 204 });
      }),
      http.post(`${API}/stages/4/restore`, () => {
        calls.push("restore");
        return HttpResponse.json(buildStage());
      }),
    );
    const { user, router } = renderAt("/stages", PAGES);
    await user.click(await screen.findByRole("button", { name: "Delete First stage" }));
    expect(await screen.findByText("No stage kept yet.")).toBeTruthy();
    await user.click(await screen.findByRole("button", { name: "Undo" }));
    expect(await screen.findByText("First stage")).toBeTruthy();
    expect(calls).toEqual(["delete", "restore"]);
    expect(router.state.location.pathname).toBe("/stages");
  });

  it("offers a viewer no deleting", async () => {
    signedInAs("viewer");
    server.use(http.get(`${API}/stages`, () => HttpResponse.json({ items: [buildStage()] })));
    renderAt("/stages", PAGES);
    await screen.findByText("First stage");
    expect(screen.getByRole("link", { name: "First brief" }).getAttribute("href")).toBe("/briefs/7");
    expect(screen.queryByRole("button", { name: /delete/i })).toBeNull();
  });

  it("shows each stage's balance and opens its sheet by keyboard", async () => {
    signedInAs("viewer");
    playStage();
    server.use(http.get(`${API}/stages`, () => HttpResponse.json({ items: [buildStage()] })));
    const { user, router } = renderAt("/stages", PAGES);
    const row = (await screen.findByText("First stage")).closest<HTMLElement>("[role='row'], tr");
    expect(
      within(row as HTMLElement)
        .getByRole("img")
        .getAttribute("aria-label"),
    ).toMatch(/of room toward the ohmic region/);
    row?.focus();
    await user.keyboard("{Enter}");
    await waitFor(() => expect(router.state.location.pathname).toBe("/stages/4"));
  });

  it("says what goes there when it is empty, with the first step", async () => {
    signedInAs("designer");
    server.use(http.get(`${API}/stages`, () => HttpResponse.json({ items: [] })));
    renderAt("/stages", PAGES);
    expect(await screen.findByText("No stage kept yet.")).toBeTruthy();
    expect(screen.getByRole("link", { name: "Write a brief" }).getAttribute("href")).toBe("/briefs/new");
  });
});
