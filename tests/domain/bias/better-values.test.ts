import { describe, expect, it } from "vitest";
import { describeStage } from "#shared/bias/stage-sheet";
import { type BetterValue, betterValues } from "#shared/bias/why/better-values";
import { wayToSaturation } from "#shared/bias/why/way-to-saturation";
import { type Brief, type BriefInput, briefSchema } from "#shared/schemas/brief";
import { type ResistorKey, type Resistors, resistorsOf } from "#shared/schemas/circuit";
import { isInSeries, mantissas, type SeriesName } from "#shared/values/e-series";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";

const PART = buildPart();
const RESISTORS = buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 });

function briefIn(series: SeriesName, conditions: Partial<BriefInput> = {}): Brief {
  return briefSchema.parse({
    rail: { volts: 12 },
    load: { ohms: 10e3 },
    ambient: { min: 0, max: 50 },
    resistors: { divider: { series }, drain: { series }, source: { series } },
    ...conditions,
  });
}

const centringOf = (brief: Brief, resistors: Resistors) =>
  describeStage(PART, brief, resistors).bias.centringError ?? 1;

const assuredOf = (brief: Brief, resistors: Resistors) =>
  describeStage(PART, brief, resistors).assured.swing.symmetric;

/** Every value of a series from 1 Ω to 10 MΩ, written apart from the product's own walk through it. */
const listed = (series: SeriesName) =>
  [0, 1, 2, 3, 4, 5, 6].flatMap((decade) =>
    mantissas(series).map((mantissa) => Number(`${mantissa}e${decade + 1 - String(mantissa).length}`)),
  );

/** The values of a series next to one, and those of E192 between them, the nearest first. */
function around(series: SeriesName, value: number) {
  const lower = Math.max(...listed(series).filter((one) => one < value));
  const higher = Math.min(...listed(series).filter((one) => one > value));
  const between = listed("E192").filter((one) => one > lower && one < higher && one !== value);
  const distance = (one: number) => Math.max(one / value, value / one);
  return { steps: [lower, higher], between: between.sort((a, b) => distance(a) - distance(b)) };
}

describe("better values", () => {
  it.each<SeriesName>(["E3", "E6", "E12", "E24", "E96"])(
    "of %s: a better step where there is one, else the nearest of E192 that is better",
    (series) => {
      const brief = briefIn(series);
      const resistors = buildResistors({ r1: 2.2e6, r2: 1e6, rd: 2200, rs: 1000 });
      const now = centringOf(brief, resistors);
      const found = betterValues(PART, brief, resistors);
      for (const key of resistorsOf("four-resistor")) {
        const { steps, between } = around(series, resistors[key]);
        const isBetter = (value: number) => centringOf(brief, { ...resistors, [key]: value }) <= now - 1e-3;
        const one = found.find(({ resistor }) => resistor === key);
        if (steps.some(isBetter)) {
          expect(one).toMatchObject({ series, isRelaxed: false, improves: "centring" });
          expect(steps).toContain(one?.value);
        } else if (between.some(isBetter)) {
          expect(one).toMatchObject({ series: "E192", isRelaxed: true, value: between.find(isBetter) });
        } else {
          expect(one?.improves).not.toBe("centring");
        }
      }
    },
  );

  it("say what centring and assured swing would become", () => {
    const brief = briefIn("E24");
    const found = betterValues(PART, brief, RESISTORS);
    expect(found.length).toBeGreaterThan(0);
    for (const { resistor, value, centringError, assured } of found) {
      const changed = { ...RESISTORS, [resistor]: value };
      expect(centringError).toBe(centringOf(brief, changed));
      expect(assured).toBe(assuredOf(brief, changed));
    }
  });

  it("are one a resistor at most, the best centred first", () => {
    const found = betterValues(PART, briefIn("E24"), RESISTORS);
    expect(new Set(found.map(({ resistor }) => resistor)).size).toBe(found.length);
    const centring = found.filter(({ improves }) => improves === "centring");
    const errors = centring.map(({ centringError }) => centringError);
    expect(errors).toEqual([...errors].sort((a, b) => a - b));
    expect(found.slice(0, centring.length)).toEqual(centring);
  });

  it("leave out what would miss a condition that is met", () => {
    const free = byResistor(betterValues(PART, briefIn("E24"), RESISTORS));
    // The stage takes 1.62 mA; more current is what centres it by R1, R2 and RS.
    const { supplyCurrent } = describeStage(PART, briefIn("E24"), RESISTORS);
    const bound = briefIn("E24", { supplyCurrent: { max: 1.001 * supplyCurrent } });
    const held = byResistor(betterValues(PART, bound, RESISTORS));
    expect(free.r1?.improves).toBe("centring");
    expect(held.r1?.improves).not.toBe("centring");
    expect(held.rd?.improves).toBe("centring");
    for (const { resistor, value } of Object.values(held)) {
      const changed = describeStage(PART, bound, { ...RESISTORS, [resistor]: value });
      expect(changed.supplyCurrent).toBeLessThanOrEqual(1.001 * supplyCurrent);
    }
  });

  it("stay in the brief's ranges", () => {
    const brief = briefIn("E24", {
      resistors: { drain: { series: "E24", min: 2700, max: 2700 }, source: { series: "E24" } },
    });
    expect(byResistor(betterValues(PART, brief, RESISTORS)).rd).toBeUndefined();
  });

  it("raise what every build has by a step of the series where nothing centres the stage better", () => {
    // A centred divider of E192, so that no value around it does better.
    const brief = briefIn("E24");
    const centred = byCentring(brief);
    const found = betterValues(PART, brief, centred);
    const raised = found.filter(({ improves }) => improves === "assured");
    expect(raised.length).toBeGreaterThan(0);
    for (const { resistor, value, assured } of raised) {
      expect(isInSeries("E24", value)).toBe(true);
      expect(assured).toBeGreaterThan(1.01 * assuredOf(brief, centred));
      expect(assured).toBe(assuredOf(brief, { ...centred, [resistor]: value }));
    }
  });

  const byResistor = (found: BetterValue[]): Partial<Record<ResistorKey, BetterValue>> =>
    Object.fromEntries(found.map((one) => [one.resistor, one]));

  function byCentring(brief: Brief): Resistors {
    const tried = listed("E192")
      .filter((rd) => rd > 2000 && rd < 4000)
      .map((rd) => ({ ...RESISTORS, rd }));
    return tried.reduce((best, one) => (centringOf(brief, one) < centringOf(brief, best) ? one : best));
  }
});

describe("the way to saturation", () => {
  it("says of a stage that is off which resistors turn it on", () => {
    expect(wayToSaturation(PART, briefIn("E24"), { ...RESISTORS, r2: 100e3 })).toEqual({
      lower: ["r1"],
      raise: ["r2"],
    });
  });

  it("says of an ohmic stage what lifts its drain", () => {
    expect(wayToSaturation(PART, briefIn("E24"), { ...RESISTORS, rd: 10e3 })).toEqual({
      lower: ["r2", "rd"],
      raise: ["r1", "rs"],
    });
  });

  it("names none where no resistor acts: a gate at ground is turned on by its negative rail", () => {
    const brief = briefIn("E24", { circuit: "negative-rail", rail: { volts: 12, negative: 1 } });
    const resistors = buildResistors({ rg: 1e6, rd: 3300, rs: 5600 });
    expect(wayToSaturation(PART, brief, resistors)).toEqual({ lower: [], raise: [] });
  });
});
