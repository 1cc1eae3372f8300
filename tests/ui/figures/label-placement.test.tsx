import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { loadLineFigure } from "#shared/bias/figure";
import { briefSchema } from "#shared/schemas/brief";
import { lengthInside, overlaps, placeLabels } from "../../../web/figures/label-placement";
import { labelCharacteristics, labelLoadLine } from "../../../web/figures/load-line-labels";
import { layOutLoadLine } from "../../../web/figures/load-line-layout";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";

const box = { left: 0, top: 0, right: 10, bottom: 10 };

describe("how much of a line lies in a box", () => {
  test.each([
    ["through the middle", { x: -5, y: 5 }, { x: 15, y: 5 }, 10],
    ["along a diagonal", { x: -5, y: -5 }, { x: 15, y: 15 }, Math.hypot(10, 10)],
    ["ending inside", { x: 5, y: 5 }, { x: 5, y: 25 }, 5],
    ["all inside", { x: 1, y: 1 }, { x: 4, y: 5 }, 5],
    ["past it", { x: -5, y: 12 }, { x: 15, y: 12 }, 0],
    ["short of it", { x: -9, y: 5 }, { x: -1, y: 5 }, 0],
  ])("%s", (_, from, to, length) => {
    expect(lengthInside(from, to, box)).toBeCloseTo(length, 10);
  });
});

test("a label goes where it covers no line, and the next one keeps off it", () => {
  const here = { at: { x: 100, y: 100 }, anchor: "start" as const };
  const above = { at: { x: 100, y: 60 }, anchor: "start" as const };
  const below = { at: { x: 100, y: 140 }, anchor: "start" as const };
  const line = {
    path: [
      { x: 0, y: 98 },
      { x: 300, y: 98 },
    ],
    weight: 1,
  };
  const placed = placeLabels(
    [
      { id: "a", text: "first", candidates: [here, above] },
      { id: "b", text: "second", candidates: [above, below] },
    ],
    [line],
    { left: 0, top: 0, right: 400, bottom: 300 },
    13,
  );
  expect(placed.map(({ id, at }) => [id, at.y])).toEqual([
    ["a", 60],
    ["b", 140],
  ]);
});

/** Stages of every kind, most of them badly centred: the figure must stay readable for those above all. */
const stages = fc.record({
  polarity: fc.constantFrom("n" as const, "p" as const),
  vt: fc.double({ min: 0.4, max: 4, noNaN: true }),
  k: fc.double({ min: 3e-4, max: 0.3, noNaN: true }),
  volts: fc.double({ min: 3, max: 60, noNaN: true }),
  load: fc.option(fc.double({ min: 100, max: 1e6, noNaN: true })),
  sourceResistor: fc.constantFrom("bypassed" as const, "unbypassed" as const, "none" as const),
  rd: fc.double({ min: 200, max: 47e3, noNaN: true }),
  rsShare: fc.double({ min: 0.02, max: 1, noNaN: true }),
  gate: fc.double({ min: 0.05, max: 0.6, noNaN: true }),
  width: fc.integer({ min: 320, max: 1100 }),
  drive: fc.double({ min: 0.05, max: 20, noNaN: true }),
});

test("no label lies on another or outside the drawing, for any stage at any width", () => {
  fc.assert(
    fc.property(
      stages,
      ({ vt, k, volts, load, sourceResistor, rd, rsShare, gate, width, drive, polarity }) => {
        const part = buildPart({
          polarity,
          vtMin: vt * 0.9,
          vtTyp: vt,
          vtMax: vt * 1.1,
          kMin: k * 0.7,
          kTyp: k,
          kMax: k * 1.3,
        });
        const brief = briefSchema.parse({ polarity, rail: { volts }, load: { ohms: load }, sourceResistor });
        const rs = sourceResistor === "none" ? 0 : rd * rsShare;
        const resistors = buildResistors({ r1: 1e6 * (1 - gate), r2: 1e6 * gate, rd, rs });
        const data = loadLineFigure(part, brief, resistors, 25, drive);
        const layout = layOutLoadLine(data, width);
        const labels = labelLoadLine(data, layout);
        for (const [index, { box: one, text }] of labels.entries()) {
          expect(one.left, text).toBeGreaterThanOrEqual(0);
          expect(one.right, text).toBeLessThanOrEqual(width);
          expect(one.bottom, text).toBeLessThanOrEqual(layout.height);
          for (const other of labels.slice(index + 1)) {
            expect(overlaps(one, other.box), `${text} on ${other.text}`).toBe(false);
          }
        }
        const gateLabels = labelCharacteristics(data, layout).map(({ y }) => y);
        const gaps = [...gateLabels]
          .sort((a, b) => a - b)
          .map((y, index, all) => y - (all[index - 1] ?? -100));
        for (const gap of gaps) expect(gap).toBeGreaterThanOrEqual(13.9);
      },
    ),
    { numRuns: 300 },
  );
});
