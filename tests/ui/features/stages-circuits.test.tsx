import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { type Brief, type BriefInput, briefSchema } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type Resistors } from "#shared/schemas/circuit";
import { MethodPage } from "../../../web/features/method/method-page";
import { buildResistors } from "../../support/build-stage";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";
import { buildStage, figure, PAGES, playStage, step } from "../support/stages";

playServer();

type Drawn = { circuit: Brief["circuit"]; brief: Partial<BriefInput>; resistors: Partial<Resistors> };

const DRAWN: Drawn[] = [
  { circuit: "four-resistor", brief: {}, resistors: { r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 } },
  {
    circuit: "four-resistor",
    brief: { sourceResistor: "none" },
    resistors: { r1: 2.4e6, r2: 360e3, rd: 2700 },
  },
  {
    circuit: "split-source",
    brief: {},
    resistors: { r1: 1.8e6, r2: 750e3, rd: 2700, rs: 220, rs2: 1000 },
  },
  {
    circuit: "follower",
    brief: { sourceResistor: "unbypassed" },
    resistors: { r1: 1e6, r2: 1.5e6, rs: 2200 },
  },
  { circuit: "drain-feedback", brief: {}, resistors: { r2: 2.2e6, rg: 3.3e6, rd: 2700, rs: 470 } },
  {
    circuit: "drain-feedback",
    brief: { sourceResistor: "none" },
    resistors: { rg: 3.3e6, rd: 2700 },
  },
  {
    circuit: "negative-rail",
    brief: { rail: { volts: 12, negative: 9 } },
    resistors: { rg: 1e6, rd: 3300, rs: 5600 },
  },
];

/** Opens the sheet of a stage of a circuit, by somebody who may change it. */
function open({ circuit, brief, resistors }: Drawn) {
  signedInAs("designer");
  const asked = briefSchema.parse({
    circuit,
    rail: { volts: 12 },
    load: { ohms: 10e3 },
    swing: { peak: 0.5 },
    ambient: { min: 0, max: 50 },
    ...brief,
  });
  const stage = buildStage({ brief: asked, resistors: buildResistors(resistors) });
  playStage(stage);
  return { ...renderAt("/stages/4", PAGES), stage };
}

const drawn = (circuit: Brief["circuit"]) => DRAWN.find((one) => one.circuit === circuit) as Drawn;

describe.each(DRAWN)("the sheet of a $circuit stage with $resistors", (one) => {
  const present = RESISTOR_KEYS.filter((key) => one.resistors[key] !== undefined).map((key) =>
    key.toUpperCase(),
  );

  it("steps the resistors that it has and shows no other", async () => {
    const { user } = open(one);
    await figure("Drain current");
    const groups = screen.getAllByRole("group").map((group) => group.querySelector("legend")?.textContent);
    expect(groups).toEqual(present);
    const before = await figure("Drain-source voltage");
    const last = present[present.length - 1];
    await step(user, last, "higher");
    expect(await figure("Drain-source voltage")).not.toBe(before);
    const absent = RESISTOR_KEYS.map((key) => key.toUpperCase()).filter((name) => !present.includes(name));
    const sheet = document.body.textContent ?? "";
    for (const name of absent) expect(sheet).not.toMatch(new RegExp(`\\b${name}\\b`));
  });

  it("says what each of its resistors does", async () => {
    open(one);
    const why = await screen.findByRole("region", { name: "Why" });
    const rows = within(within(why).getByRole("table", { name: /^What \+1 %/ })).getAllByRole("rowheader");
    const names = rows.map((row) => row.textContent).filter((name) => /^R[A-Z0-9]{1,2}$/.test(name ?? ""));
    expect(names).toEqual(present);
  });

  it("draws its load line and its balance, and links to nothing that the method page lacks", async () => {
    open(one);
    expect(await screen.findByRole("img", { name: /^Load lines on a/ })).toBeTruthy();
    expect(screen.getByRole("img", { name: /of room toward the ohmic region/ })).toBeTruthy();
    const ids = screen
      .getAllByRole("link")
      .flatMap((link) => link.getAttribute("href")?.match(/^\/method#(.+)$/)?.[1] ?? []);
    renderAt("/method", { "/method": <MethodPage /> });
    expect(ids.length).toBeGreaterThan(15);
    expect(ids.filter((id) => document.getElementById(id) === null)).toEqual([]);
  });
});

describe("what is a circuit's own", () => {
  it("is a follower's output at its source", async () => {
    const { stage } = open(drawn("follower"));
    expect(await figure("Drain, source (output) to ground")).toMatch(/^12\.0 V, \d\.\d+ V$/);
    // A gate at 7.2 V less about 1.6 V of VGS: the output rests there.
    const rests = Number.parseFloat((await figure("Drain, source (output) to ground")).split(", ")[1]);
    const amperes = Number.parseFloat(await figure("Drain current")) / 1000;
    expect(rests).toBeCloseTo(amperes * stage.resistors.rs, 1);
    expect(Number.parseFloat(await figure("Gain"))).toBeGreaterThan(0);
  });

  it("is a gate at ground, and a negative rail in magnitude and sign", async () => {
    open(drawn("negative-rail"));
    expect(await figure("Negative rail")).toBe("−9 V");
    expect(await figure("Gate voltage")).toBe("0 V");
    const source = (await figure("Drain (output), source to ground")).split(", ")[1];
    // The source lies VGS below the gate.
    expect(source).toBe(`−${await figure("Gate-source voltage")}`);
  });

  it("is how it gets out of cutoff", async () => {
    open({ ...drawn("drain-feedback"), resistors: { r2: 330e3, rg: 3.3e6, rd: 2700, rs: 470 } });
    expect(await screen.findByText(/the device is off.+Raise R2 or lower RG\./)).toBeTruthy();
  });

  it("is that no resistor gets it out of cutoff where its rail is too low", async () => {
    open({ ...drawn("negative-rail"), brief: { rail: { volts: 12, negative: 1 } } });
    expect(await screen.findByText(/the device is off\. No resistor turns it on: raise the/)).toBeTruthy();
  });
});

describe("the list of stages of several circuits", () => {
  it("has a column for each resistor that one of them has, and a dash where another lacks it", async () => {
    signedInAs("viewer");
    const follower = drawn("follower");
    const split = drawn("split-source");
    const items = [follower, split].map(({ circuit, brief, resistors }, at) =>
      buildStage({
        id: 4 + at,
        name: circuit,
        brief: briefSchema.parse({ circuit, rail: { volts: 12 }, ...brief }),
        resistors: buildResistors(resistors),
      }),
    );
    server.use(http.get(`${API}/stages`, () => HttpResponse.json({ items })));
    renderAt("/stages", PAGES);
    await screen.findByText("split-source");
    for (const name of ["R1", "R2", "RD", "RS", "RS2"]) {
      expect(screen.getByRole("columnheader", { name: new RegExp(`^${name}\\b`) })).toBeTruthy();
    }
    expect(screen.queryByRole("columnheader", { name: /^RG/ })).toBeNull();
    const row = screen.getByRole("row", { name: /follower/ });
    expect(within(row).getAllByText("—").length).toBe(2);
  });
});
