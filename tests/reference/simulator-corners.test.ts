import { describe, expect, it } from "vitest";
import { terminalCapacitances } from "#shared/bias/high-corner";
import { describeStage } from "#shared/bias/stage-sheet";
import { seededRandom } from "../support/random";
import { SEED } from "../support/seed";
import { drawCoupling, drawHeld, drawNetlist, outputOf } from "./netlist";
import { runNgspice } from "./ngspice";
import { drawStages } from "./random-stages";

const ROOM = [1.3, 6] as const;
const EACH = 24;

describe(`low corners of every circuit agree with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 4), EACH, ROOM).map((drawn) => {
    const { capacitors } = describeStage(drawn.part, drawn.brief, drawn.resistors);
    if (capacitors === null) throw new Error(`${drawn.name} has no capacitors`);
    return { ...drawn, capacitors };
  });
  const [sweep, midBand] = runNgspice(
    cases.flatMap(({ device, stage, brief, capacitors }, n) => [
      ...drawNetlist(device, stage, `${n}`),
      ...drawCoupling(stage, `${n}`, brief.source.ohms, capacitors),
    ]),
    ["ac dec 60 0.1 1e6", "ac lin 1 1e12 1e12"],
    cases.flatMap(({ stage }, n) => `v(${outputOf(stage)}${n})`),
  );

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ brief, stage, n }) => {
    const name = `v(${outputOf(stage)}${n})`;
    const response = sweep.of(name).reverse();
    const corner = fallsTo(sweep.of("frequency").reverse(), response, midBand.of(name)[0] / Math.SQRT2);
    expect(Math.abs(corner / brief.lowCorner.hertz - 1)).toBeLessThan(0.03);
  });
});

describe(`high corners of every circuit agree with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 5), EACH, ROOM);
  const [sweep, midBand] = runNgspice(
    [
      "vsignal signal 0 dc 0 ac 1",
      ...cases.flatMap(({ device, stage, brief, part }, n) => {
        const { cgs, cgd, cds } = terminalCapacitances(part);
        return [
          ...drawHeld(device, stage, `${n}`, "v(signal)", brief.source.ohms),
          `cgs${n} g${n} s${n} ${cgs}`,
          `cgd${n} g${n} d${n} ${cgd}`,
          `cds${n} d${n} s${n} ${cds}`,
        ];
      }),
    ],
    ["ac dec 60 1 1e13", "ac lin 1 1 1"],
    cases.flatMap(({ stage }, n) => `v(${outputOf(stage)}${n})`),
  );
  const solved = cases.map((drawn) => describeStage(drawn.part, drawn.brief, drawn.resistors).highCorner);

  it("exist on most of them", () => {
    expect(solved.filter((corner) => corner !== null).length).toBeGreaterThan(0.7 * cases.length);
  });

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ stage, n }) => {
    const name = `v(${outputOf(stage)}${n})`;
    const corner = fallsTo(sweep.of("frequency"), sweep.of(name), midBand.of(name)[0] / Math.SQRT2);
    // A stage whose gain never falls so far has no corner in either.
    expect(solved[n] === null).toBe(Number.isNaN(corner));
    if (solved[n] !== null) expect(Math.abs(solved[n] / corner - 1)).toBeLessThan(0.03);
  });
});

/** Where a response first falls to a level, on a logarithmic scale between its points; NaN where it never does. */
function fallsTo(hertz: readonly number[], response: readonly number[], level: number): number {
  const at = response.findIndex((magnitude) => magnitude <= level);
  if (at < 1) return Number.NaN;
  const [above, below] = [Math.log(response[at - 1] / level), Math.log(response[at] / level)];
  return hertz[at - 1] * (hertz[at] / hertz[at - 1]) ** (above / (above - below));
}
