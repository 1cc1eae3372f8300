import { describe, expect, it } from "vitest";
import { describeStage } from "#shared/bias/stage-sheet";
import { marginsOf } from "#shared/bias/why/margins";
import { type Brief, type BriefInput, briefSchema } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { missedConditions } from "../../../web/features/stages/missed-conditions";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";

const RESISTORS = buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 });

function briefWith(conditions: Partial<BriefInput> = {}): Brief {
  return briefSchema.parse({ rail: { volts: 12 }, load: { ohms: 10e3 }, ...conditions });
}

function missed(brief: Brief, { part = buildPart(), resistors = RESISTORS } = {}): string[] {
  return missedConditions(part, brief, resistors, marginsOf(part, brief, resistors));
}

// The stage sits at 1.62 mA and 5.70 V with 1.94 V across RS; R1 and R2 in parallel are 529 kΩ.
describe("the conditions that a stage misses", () => {
  it("are none for a brief that asks for nothing", () => {
    expect(missed(briefWith())).toEqual([]);
  });

  it.each<[string, Partial<BriefInput>, RegExp]>([
    ["swing", { swing: { peak: 5 } }, /^The swing is 3\.\d+ V, below the 5 V asked for\.$/],
    ["least gain", { gain: { min: 50 } }, /^The gain is .+, below the 50 asked for\.$/],
    ["greatest gain", { gain: { max: 2 } }, /^The gain is .+, above the 2 allowed\.$/],
    [
      "input resistance",
      { inputResistance: { min: 1e6 } },
      /^The input resistance is 529 kΩ, below the 1 MΩ asked for\.$/,
    ],
    [
      "supply current",
      { supplyCurrent: { max: 1e-3 } },
      /^The supply current is 1\.62 mA, above the 1 mA allowed\.$/,
    ],
    [
      "source drop",
      { sourceDrop: { min: 3 } },
      /^The drop across RS is 1\.9\d V, below the 3 V asked for\.$/,
    ],
    ["high corner", { highCorner: { min: 1e9 } }, /^The high corner is .+Hz, below the 1 GHz asked for\.$/],
    [
      "distortion",
      { swing: { peak: 1 }, distortion: { max: 1e-4 } },
      /^The second harmonic at 1 V peak is .+ %, above the 0\.01 % allowed\.$/,
    ],
  ])("name the %s alone where only that is out of reach", (_name, conditions, words) => {
    expect(missed(briefWith(conditions))).toEqual([expect.stringMatching(words)]);
  });

  it("name the drain-source rating that the rail goes past", () => {
    expect(missed(briefWith(), { part: buildPart({ vdss: 14 }) })).toEqual([
      "The supply is above 80 % of the 14 V drain-source rating.",
    ]);
  });

  it("name the dissipation that the derated rating doesn't allow", () => {
    const [words, ...others] = missed(briefWith(), { part: buildPart({ pd25: 0.01 }) });
    expect(words).toMatch(/^The dissipation is 9\.2\d mW, above the 5 mW allowed\.$/);
    expect(others).toEqual([]);
  });

  it("stand in the order of what is missed by most", () => {
    const [first, second, ...others] = missed(briefWith({ swing: { peak: 5 }, sourceDrop: { min: 20 } }));
    expect([first, second]).toEqual([
      expect.stringMatching(/^The drop across RS/),
      expect.stringMatching(/^The swing/),
    ]);
    expect(others).toEqual([]);
  });

  it("never are the assured swing alone: the swing is asked of the typical device", () => {
    expect(missed(briefWith({ swing: { peak: 3 }, ambient: { min: -10, max: 50 } }))).toEqual([]);
  });

  it("are one where the device is off, and say how to turn it on", () => {
    const words = missed(briefWith({ gain: { min: 5 } }), { resistors: { ...RESISTORS, r2: 100e3 } });
    expect(words).toEqual([expect.stringContaining("Raise R2 or lower R1")]);
  });
});

describe("what is advised in the ohmic region", () => {
  const ohmic: Resistors = { ...RESISTORS, rd: 10e3 };
  const part = buildPart();

  it("takes the device toward saturation, step by step", () => {
    const brief = briefWith();
    expect(missed(brief, { resistors: ohmic })).toEqual([
      expect.stringContaining("Lower R2 or RD, or raise R1 or RS."),
    ]);
    const before = pastTheEdge(part, brief, ohmic);
    expect(before).toBeLessThan(0);
    for (const change of [{ r2: 680e3 }, { rd: 9.1e3 }, { r1: 2e6 }, { rs: 1300 }]) {
      expect(pastTheEdge(part, brief, { ...ohmic, ...change })).toBeGreaterThan(before);
    }
  });

  it("leaves RS out where there is none", () => {
    const brief = briefWith({ sourceResistor: "none" });
    expect(missed(brief, { resistors: { ...ohmic, rs: 0 } })).toEqual([
      expect.stringMatching(/Lower R2 or RD, or raise R1\.$/),
    ]);
  });

  /** How far VDS lies above the overdrive, V. */
  function pastTheEdge(of: Part, brief: Brief, resistors: Resistors): number {
    const { bias } = describeStage(of, brief, resistors);
    return bias.vds - bias.overdrive;
  }
});
