import { afterAll, describe, expect, it } from "vitest";
import { closePool } from "../../api/ranking/pool";
import { rankFits } from "../../api/ranking/rank-fits";
import { seededRandom } from "../support/random";
import { tryEveryCombination } from "./plain-loop";
import { drawProblem, plainBrief, SUPPLY } from "./problems";

/** Random small problems of each circuit. */
const PROBLEMS = Number(process.env.EVENSWING_PROBLEMS ?? 50);
const OBJECTIVES = ["centred", "assured", "cost"] as const;
const CIRCUITS = ["four-resistor", "split-source", "follower", "negative-rail", "drain-feedback"] as const;

afterAll(closePool);

const NAMES = ["r1", "r2", "rg", "rd", "rs", "rs2"] as const;
const valuesOf = (fit: Record<(typeof NAMES)[number], number>) => NAMES.map((name) => fit[name]);

describe.each(CIRCUITS)("the ranking of the %s circuit equals trying every combination", (circuit) => {
  for (let seed = 1; seed <= PROBLEMS; seed++) {
    const objective = OBJECTIVES[seed % OBJECTIVES.length];
    it(`on random problem ${seed}, by ${objective}`, async () => {
      const { brief, parts, combinations } = drawProblem(seededRandom(seed), circuit);
      const allowed = parts.filter((part) => brief.polarity === "either" || part.polarity === brief.polarity);
      const expected = tryEveryCombination(plainBrief(brief, objective), allowed);
      const rank = (distinct: "part" | "none", limit: number) =>
        rankFits({ brief, objective, distinct, limit }, parts, SUPPLY);

      const all = await rank("none", 5000);
      expect(all.considered).toBe((combinations / parts.length) * allowed.length);
      expect(all.fits.map((fit) => [fit.part.id, ...valuesOf(fit)])).toEqual(
        expected.slice(0, 5000).map((fit) => [fit.partId, ...valuesOf(fit)]),
      );
      expect(all.partsThatFit).toBe(new Set(expected.map((fit) => fit.partId)).size);
      all.fits.slice(0, 20).forEach((fit, n) => {
        if (objective === "cost") expect(fit.cost).toBe(expected[n].cents);
        expect(Math.abs(fit.assured.symmetric - expected[n].nanovolts * 1e-9)).toBeLessThan(2e-9);
      });

      const few = await rank("none", 7);
      expect(few.fits).toEqual(all.fits.slice(0, 7));

      const firstOfEach = expected.filter(
        (fit, index) => expected.findIndex((other) => other.partId === fit.partId) === index,
      );
      for (const limit of [100, 2]) {
        const perPart = await rank("part", limit);
        expect(perPart.fits.map((fit) => [fit.part.id, ...valuesOf(fit)])).toEqual(
          firstOfEach.slice(0, limit).map((fit) => [fit.partId, ...valuesOf(fit)]),
        );
        expect(perPart.partsThatFit).toBe(firstOfEach.length);
      }
    });
  }
});
