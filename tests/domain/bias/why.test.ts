import { describe, expect, it } from "vitest";
import { solveStage } from "#shared/bias/solve-stage";
import { describeStage, stageValues } from "#shared/bias/stage-sheet";
import { bindingLimit, type Condition, marginsOf } from "#shared/bias/why/margins";
import { sensitivitiesOf } from "#shared/bias/why/sensitivities";
import { type Brief, type BriefInput, briefSchema } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";

const PART = buildPart();
const RESISTORS = buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 });

function briefWith(conditions: Partial<BriefInput> = {}): Brief {
  return briefSchema.parse({
    rail: { volts: 12 },
    load: { ohms: 10e3 },
    ambient: { min: 0, max: 50 },
    ...conditions,
  });
}

/** A stage of each circuit that sits in saturation, off centre. */
const STAGES: { circuit: Brief["circuit"]; brief: Brief; resistors: Resistors }[] = [
  { circuit: "four-resistor" as const, resistors: RESISTORS },
  {
    circuit: "split-source" as const,
    resistors: buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 220, rs2: 1000 }),
  },
  { circuit: "follower" as const, resistors: buildResistors({ r1: 1e6, r2: 1.5e6, rs: 2200 }) },
  {
    circuit: "drain-feedback" as const,
    resistors: buildResistors({ r2: 2.2e6, rg: 3.3e6, rd: 2700, rs: 470 }),
  },
  { circuit: "negative-rail" as const, resistors: buildResistors({ rg: 1e6, rd: 3300, rs: 5600 }) },
].map(({ circuit, resistors }) => ({
  circuit,
  resistors,
  brief: briefWith({
    circuit,
    sourceResistor: circuit === "follower" ? "unbypassed" : "bypassed",
    resistors: { divider: { series: "E24" }, drain: { series: "E24" }, source: { series: "E24" } },
  }),
}));

describe("the margins of a stage", () => {
  const margin = (brief: Brief, condition: Condition, part = PART) =>
    marginsOf(part, brief, RESISTORS).find((one) => one.condition === condition);

  it("are shares of the stated limit: above zero where a least is passed", () => {
    // R1 and R2 in parallel are 529.41 kΩ.
    const found = margin(briefWith({ inputResistance: { min: 500e3 } }), "input-resistance");
    expect(found).toMatchObject({ bound: "least", stated: 500e3, required: true });
    expect(found?.margin).toBeCloseTo((1.8e6 * 750e3) / 2.55e6 / 500e3 - 1, 12);
  });

  it("are below zero where a most is passed", () => {
    const found = margin(briefWith({ supplyCurrent: { max: 1e-3 } }), "supply-current");
    const current = describeStage(PART, briefWith(), RESISTORS).supplyCurrent;
    expect(found?.bound).toBe("most");
    expect(found?.margin).toBeCloseTo((1e-3 - current) / 1e-3, 12);
    expect(found?.margin).toBeLessThan(0);
  });

  it("hold the ratings derated, the dissipation at the hottest ambient", () => {
    const brief = briefWith({ derating: { vds: 0.5, power: 0.4 } });
    expect(margin(brief, "rail-rating")).toMatchObject({ stated: 30, actual: 12, margin: 0.6 });
    // 350 mW up to 25 °C, falling to none at 150 °C: 280 mW at 50 °C.
    expect(margin(brief, "power-rating")?.stated).toBeCloseTo(0.4 * 0.28, 12);
  });

  it("count both rails against the drain-source rating", () => {
    const { brief, resistors } = STAGES[4];
    const found = marginsOf(PART, brief, resistors).find(({ condition }) => condition === "rail-rating");
    expect(found?.actual).toBe(24);
  });

  it("take the drop across all that stands at the source", () => {
    const { brief, resistors } = STAGES[1];
    const stated = { ...brief, sourceDrop: { min: 1 } };
    const drop = marginsOf(PART, stated, resistors).find(({ condition }) => condition === "source-drop");
    expect(drop?.actual).toBeCloseTo(1220 * describeStage(PART, brief, resistors).bias.id, 12);
  });

  it("are the part's ratings alone where the brief states nothing", () => {
    expect(marginsOf(PART, briefWith(), RESISTORS).map(({ condition }) => condition)).toEqual([
      "rail-rating",
      "power-rating",
    ]);
  });

  it("stand in order, the least first, and that one binds", () => {
    const brief = briefWith({
      swing: { peak: 1 },
      gain: { min: 5, max: 40 },
      supplyCurrent: { max: 1.7e-3 },
      highCorner: { min: 20e3 },
      distortion: { max: 0.1 },
      sourceDrop: { min: 0.5 },
    });
    const margins = marginsOf(PART, brief, RESISTORS);
    const shares = margins.map((one) => one.margin);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(new Set(margins.map(({ condition }) => condition)).size).toBe(9);
    expect(bindingLimit(margins).condition).toBe("supply-current");
  });

  it("name the assured swing without letting it bind: the swing is asked of the typical device", () => {
    const brief = briefWith({ swing: { peak: 2.9 } });
    const margins = marginsOf(PART, brief, RESISTORS);
    const { symmetric } = describeStage(PART, brief, RESISTORS).assured.swing;
    expect(margins[0]).toMatchObject({ condition: "assured-swing", actual: symmetric, required: false });
    expect(margins[0].margin).toBeLessThan(0);
    expect(bindingLimit(margins).condition).toBe("swing");
  });

  it("say that a stage that is off has none of what it needs", () => {
    const brief = briefWith({ swing: { peak: 1 }, highCorner: { min: 20e3 }, gain: { min: 5 } });
    const margins = marginsOf(PART, brief, { ...RESISTORS, r2: 100e3 });
    const missed = margins.filter((one) => one.margin === -1).map(({ condition }) => condition);
    expect(missed).toEqual(expect.arrayContaining(["swing", "high-corner", "gain"]));
  });
});

/**
 * By hand for λ = 0 and a bypassed RS, with d = VG - VT and x the overdrive: x + RS K x² = d, I = K x², U = I rL with
 * rL = RD || RL. The a.c. line meets the edge at v, K v² + v/rL = I + VDS/rL, and D = VDS - v. Differentials of these
 * give what each component does, per unit of its own relative change.
 */
function closedForm({ r1, r2, rd, rs }: Resistors) {
  const [k, vt, vdd, rl] = [PART.kTyp, PART.vtTyp, 12, 10e3];
  const vg = (vdd * r2) / (r1 + r2);
  const x = (Math.sqrt(1 + 4 * rs * k * (vg - vt)) - 1) / (2 * rs * k);
  const current = k * x * x;
  const load = (rd * rl) / (rd + rl);
  const vds = vdd - current * (rd + rs);
  const v = (-1 + Math.sqrt(1 + 4 * k * load * (current * load + vds))) / (2 * k * load);
  const [u, d] = [current * load, vds - v];
  const dCurrent = ({ gate = 0, rsK = 0, ofK = 0 }) =>
    x * x * ofK + (2 * k * x * (gate - x * x * rsK)) / (1 + 2 * k * rs * x);
  const rooms = ({ dI = 0, across = 0, dLoad = 0, dK = 0 }) => {
    const dVds = across - dI * (rd + rs);
    const dv =
      (load * dI + current * dLoad + dVds - v * v * (load * dK + k * dLoad)) / (1 + 2 * k * load * v);
    return { du: load * dI + current * dLoad, dd: dVds - dv };
  };
  const slopes = {
    r1: rooms({ dI: dCurrent({ gate: -(vg * r1) / (r1 + r2) }) }),
    r2: rooms({ dI: dCurrent({ gate: (vg * r1) / (r1 + r2) }) }),
    rd: rooms({ across: -current * rd, dLoad: rd * (rl / (rd + rl)) ** 2 }),
    rs: rooms({ dI: dCurrent({ rsK: rs * k }), across: -current * rs }),
    rl: rooms({ dLoad: rl * (rd / (rd + rl)) ** 2 }),
    rail: rooms({ dI: dCurrent({ gate: vg }), across: vdd }),
    vt: rooms({ dI: dCurrent({ gate: -vt }) }),
    k: rooms({ dI: dCurrent({ rsK: rs * k, ofK: k }), dK: k }),
  };
  return { u, d, slopes };
}

describe("what one per cent more of a component does", () => {
  const square = buildPart({ lambda: 0 });

  it.each([
    { side: "cutoff", resistors: RESISTORS },
    { side: "the ohmic region", resistors: { ...RESISTORS, rd: 4300 } },
  ])("follows the closed forms where room toward $side runs out first", ({ side, resistors }) => {
    const { u, d, slopes } = closedForm(resistors);
    expect(u < d).toBe(side === "cutoff");
    const found = sensitivitiesOf(square, briefWith(), resistors);
    expect(found.map(({ component }) => component).sort()).toEqual(Object.keys(slopes).sort());
    for (const { component, swing, swingShare, centring } of found) {
      const { du, dd } = slopes[component as keyof typeof slopes];
      const change = u < d ? du : dd;
      expect(swing, component).toBeCloseTo(0.01 * change, 8);
      expect(swingShare, component).toBeCloseTo((0.01 * change) / Math.min(u, d), 8);
      const lean = (2 * (d * du - u * dd)) / (u + d) ** 2;
      expect(centring, component).toBeCloseTo(0.01 * (u < d ? -lean : lean), 8);
    }
  });

  it("is nothing for a load that isn't there, and nothing at all for a stage that is off", () => {
    const unloaded = sensitivitiesOf(PART, briefWith({ load: { ohms: null } }), RESISTORS);
    expect(unloaded.map(({ component }) => component)).toEqual(["r1", "r2", "rd", "rs", "rail", "vt", "k"]);
    expect(sensitivitiesOf(PART, briefWith(), { ...RESISTORS, r2: 100e3 })).toEqual([]);
  });

  it.each(STAGES)("is what solving the $circuit stage anew gives", ({ brief, resistors }) => {
    const device = { vt: PART.vtTyp, k: PART.kTyp, lambda: PART.lambda };
    const stage = stageValues(brief, resistors);
    const solved = (component: string, by: number) => {
      const key = { rail: "vdd", negativeRail: "vss" }[component] ?? component;
      const changed = { ...device, ...stage, [key]: by * { ...device, ...stage }[key as "vdd"] };
      const { vt, k, lambda, ...rest } = changed;
      return solveStage({ vt, k, lambda }, rest);
    };
    const found = sensitivitiesOf(PART, brief, resistors);
    const present = Object.entries(resistors).filter(([, ohms]) => ohms > 0);
    const rails = brief.circuit === "negative-rail" ? ["rail", "negativeRail"] : ["rail"];
    const names = [...present.map(([name]) => name), "rl", ...rails, "vt", "k"];
    expect(found.map(({ component }) => component).sort()).toEqual(names.sort());
    for (const { component, swing, centring } of found) {
      const [more, less] = [solved(component, 1.0005), solved(component, 0.9995)];
      expect(swing).toBeCloseTo(10 * ((more.swing?.symmetric ?? 0) - (less.swing?.symmetric ?? 0)), 5);
      expect(centring).toBeCloseTo(10 * ((more.centringError ?? 1) - (less.centringError ?? 1)), 5);
    }
  });
});
