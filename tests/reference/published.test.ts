import { describe, expect, it } from "vitest";
import { circuitOf } from "#shared/bias/circuits/registry";
import { drainCurrent, thresholdAt } from "#shared/bias/device";
import { millerCapacitances, millerPoles } from "#shared/bias/high-corner";
import { smallSignalOf } from "#shared/bias/network";
import { solveStage } from "#shared/bias/solve-stage";
import { transitionPoint } from "#shared/bias/swing";
import type { Bias, Device, StageValues } from "#shared/schemas/bias";
import { buildStageValues } from "../support/build-stage";
import gainDistortion from "./checks/gain-distortion.json";
import operatingPoints from "./checks/operating-points.json";
import published from "./checks/published.json";

type Case = {
  id: string;
  device: Device;
  stage: StageValues;
  result: Record<string, unknown>;
  source?: string;
};

const relative = (actual: number, expected: number) => Math.abs(actual / expected - 1);

describe("operating points solved beforehand by a circuit simulator (ngspice 39, level 1)", () => {
  it.each(operatingPoints.cases as unknown as Case[])("$id", ({ device, stage, result }) => {
    const bias = solveStage(device, buildStageValues(stage));
    expect(bias.region).toBe(result.region);
    expect(relative(bias.id, result.id as number)).toBeLessThan(1e-3);
    expect(relative(bias.vds, result.vds as number)).toBeLessThan(1e-3);
    expect(relative(bias.vgs, result.vgs as number)).toBeLessThan(1e-3);
  });
});

describe("gain and second harmonic solved beforehand by a circuit simulator", () => {
  it.each(gainDistortion.cases as unknown as (Case & { input: { peak: number } })[])(
    "$id",
    ({ device, stage, input, result }) => {
      const bias = solveStage(device, buildStageValues(stage), input.peak);
      // The simulator's gain is the fundamental over the input at that peak, so compression is in it.
      expect(relative(Math.abs(bias.gain), result.gainMagnitude as number)).toBeLessThan(5e-3);
      expect(relative(bias.distortion?.secondHarmonic ?? 0, result.hd2 as number)).toBeLessThan(1e-4);
    },
  );
});

describe("worked examples with published inputs", () => {
  const cases = published.cases as unknown as Case[];
  const named = (id: string) => {
    const found = cases.find((entry) => entry.id === id);
    if (!found) throw new Error(`No published case ${id}`);
    return found;
  };
  const fourResistor = cases.filter(
    (entry) => (entry as { circuit?: string }).circuit === "four-resistor" && entry.stage?.r1 && entry.device,
  );

  it.each(fourResistor)("$id: $source", ({ device, stage, result }) => {
    const bias = solveStage(device, buildStageValues(stage));
    expect(bias.region).toBe(result.region);
    for (const key of ["vg", "id", "vgs", "vds", "gm"] as const) {
      const expected = result[key];
      if (expected !== undefined) expect(relative(bias[key], expected as number)).toBeLessThan(1e-3);
    }
  });

  // A feedback resistor large enough to carry no signal, where the example names none.
  const LARGE = 100e6;
  const otherCircuits = cases.flatMap((entry): (Omit<Case, "stage"> & { stage: StageValues })[] => {
    const { circuit } = entry as { circuit?: string };
    const { vss, rg = LARGE, ...stage }: Partial<StageValues> = entry.stage ?? {};
    if (circuit === "gate-at-ground") {
      const values = { ...stage, circuit: "negative-rail" as const, vss: Math.abs(vss ?? 0), rg };
      return [{ ...entry, stage: buildStageValues(values) }];
    }
    if (circuit !== "drain-feedback") return [];
    return [{ ...entry, stage: buildStageValues({ ...stage, circuit: "drain-feedback", rg }) }];
  });

  it("hold both a negative rail and drain feedback", () => {
    const circuits = otherCircuits.map(({ stage }) => stage.circuit);
    expect(circuits.filter((circuit) => circuit === "negative-rail")).toHaveLength(1);
    expect(circuits.filter((circuit) => circuit === "drain-feedback")).toHaveLength(3);
  });

  it.each(otherCircuits)("$id: $source", ({ device, stage, result }) => {
    const bias = solveStage(device, stage);
    expect(bias.region).toBe(result.region);
    for (const key of ["id", "vds", "gm"] as const) {
      const expected = result[key];
      if (expected !== undefined) expect(relative(bias[key], expected as number)).toBeLessThan(1e-3);
    }
  });

  it("drain-feedback-15v: gain and input resistance with an ro of 50 V over the current", () => {
    const found = otherCircuits.find(({ id }) => id === "drain-feedback-15v");
    if (!found) throw new Error("No published case drain-feedback-15v");
    const { device, result, stage } = found;
    const { region, id, vds, vgs } = solveStage(device, stage);
    const circuit = circuitOf(stage.circuit);
    // The source leaves ro out at d.c. and takes 50 V/ID for it: the λ that gives that ro here, and the K that keeps
    // the current.
    const lambda = 1 / (50 - vds);
    const modulated = { vt: device.vt, k: device.k / (1 + lambda * vds), lambda };
    const { gain, gds } = smallSignalOf(modulated, circuit.network(stage), { region, id, vds, vgs });
    const expected = result as { ro: number; gain: number; inputResistance: number };
    expect(relative(1 / gds, expected.ro)).toBeLessThan(1e-3);
    expect(relative(gain, expected.gain)).toBeLessThan(1e-3);
    expect(relative(circuit.inputResistance(stage, gain), expected.inputResistance)).toBeLessThan(1e-3);
  });

  it("divider-10v-centred has 3.000 V toward cutoff and 2.630 V toward the ohmic region", () => {
    const { device, stage } = named("divider-10v-centred");
    const { swing } = solveStage(device, buildStageValues(stage));
    expect(swing?.towardCutoff).toBeCloseTo(3.0, 6);
    expect(swing?.towardOhmic).toBeCloseTo(2.63, 3);
  });

  it("edge-of-saturation: where a resistive load line meets it, and the middle of what is left", () => {
    const { device, stage, result } = named("edge-of-saturation") as Case & {
      result: { transition: { vds: number; id: number }; midOutput: { vds: number; id: number } };
    };
    // Any point of the d.c. line will do to start from: with RS = 0 and no load both lines are one.
    const start = { vds: stage.vdd / 2, id: stage.vdd / 2 / stage.rd };
    const edge = transitionPoint(device, start, stage.rd);
    expect(relative(edge.vds, result.transition.vds)).toBeLessThan(1e-3);
    expect(relative(edge.id, result.transition.id)).toBeLessThan(1e-3);
    expect(relative((edge.vds + stage.vdd) / 2, result.midOutput.vds)).toBeLessThan(1e-3);
    expect(relative(edge.id / 2, result.midOutput.id)).toBeLessThan(1e-3);
  });

  it("gain-at-two-currents: gm and ro together at 0.5 mA and 1 mA (FOSSEE 3515, example 2.22)", () => {
    // VGS 2 V at 0.5 mA with VT 0.9 V gives K; ro is 50 V over the current, and the drain resistor 10 kΩ.
    const k = 0.5e-3 / (2 - 0.9) ** 2;
    for (const [id, gain] of [
      [0.5e-3, -8.26],
      [1e-3, -10.71],
    ]) {
      const gm = 2 * Math.sqrt(k * id);
      const ro = 50 / id;
      const device: Device = { polarity: "n", vt: 0.9, k, lambda: 0 };
      expect(drainCurrent(device, 0.9 + Math.sqrt(id / k), 5)).toBeCloseTo(id, 12);
      expect(-gm * ((10e3 * ro) / (10e3 + ro))).toBeCloseTo(gain, 1);
    }
  });

  it("miller: input and output capacitance and the output corner (FOSSEE 2882, example 9.19)", () => {
    const { result } = named("miller") as Case & { result: Record<string, number> };
    const gain = 7.5e-3 * 1.2e3;
    const miller = millerCapacitances(2.5e-12, gain);
    expect(relative(6e-12 - 2.5e-12 + miller.input, result.millerInput)).toBeLessThan(1e-3);
    expect(relative(miller.output, result.millerOutput)).toBeLessThan(1e-3);
    const stage = {
      gm: 7.5e-3,
      gds: 0,
      drain: 1.2e3,
      source: 0,
      gate: 1e6,
      feedback: null,
      output: "drain" as const,
      sourceImpedance: 1e3,
    };
    // The wiring's 1 pF stands where a drain-source capacitance would.
    const poles = millerPoles(stage, { cgs: 3.5e-12, cgd: 2.5e-12, cds: 1e-12 }, gain, 1.2e3);
    expect(relative(poles.output ?? 0, result.outputCornerHertz)).toBeLessThan(2e-3);
  });

  it("second-harmonic: A/(4 VOV) for the pure square law", () => {
    const { result } = named("second-harmonic") as unknown as {
      result: { amplitude: number; overdrive: number; hd2: number }[];
    };
    for (const { amplitude, overdrive, hd2 } of result) {
      const device: Device = { polarity: "n", vt: 1, k: 1e-3, lambda: 0 };
      const vgs = 1 + overdrive;
      // A rail high enough, and a load small enough, that even the largest amplitude stays in saturation.
      const stage = stageWithGateAt(vgs, 40);
      const { distortion } = solveStage(device, stage, amplitude) as Bias;
      expect(distortion?.secondHarmonic).toBeCloseTo(hd2, 6);
      // A square has no third harmonic.
      expect(distortion?.thirdHarmonic).toBeLessThan(1e-9);
    }
  });

  it("spread-10v-centred: the source resistor holds the current as the threshold moves", () => {
    const { device, stage } = named("divider-10v-centred");
    const { result } = named("spread-10v-centred") as unknown as {
      result: { vt: number[]; idWithSourceResistor: number[]; idAtFixedVgs: number[] };
    };
    result.vt.forEach((vt, n) => {
      const moved = { ...device, vt: thresholdAt(vt, -2e-3, 25) };
      expect(
        relative(solveStage(moved, buildStageValues(stage)).id, result.idWithSourceResistor[n]),
      ).toBeLessThan(1e-3);
      expect(drainCurrent(moved, 2, 4)).toBeCloseTo(result.idAtFixedVgs[n], 9);
    });
  });
});

function stageWithGateAt(vg: number, vdd: number): StageValues {
  const r2 = 100e3;
  return buildStageValues({ vdd, r1: (r2 * (vdd - vg)) / vg, r2, rd: 1e3 });
}
