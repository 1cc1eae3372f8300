import fc from "fast-check";
import { afterAll, describe, expect, it } from "vitest";
import { CIRCUITS } from "#shared/schemas/circuit";
import { OBJECTIVES } from "#shared/schemas/fits";
import { closePool } from "../../api/ranking/pool";
import { rankFits } from "../../api/ranking/rank-fits";
import { seededRandom } from "../support/random";
import { tryEveryCombination } from "./plain-loop";
import { drawProblem, plainBrief, SUPPLY } from "./problems";

/** Problems so small that many can be tried. */
const MOST_COMBINATIONS = 250;
const NAMES = ["r1", "r2", "rg", "rd", "rs", "rs2"] as const;

afterAll(closePool);

describe("the ranking", () => {
  it("equals trying every combination, for any series, tolerances and limits, with twins among the parts", async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(...CIRCUITS),
        fc.constantFrom(...OBJECTIVES),
        fc.integer({ min: 1, max: 2 ** 31 }),
        fc.boolean(),
        fc.integer({ min: 1, max: 30 }),
        async (circuit, objective, seed, hasTwin, limit) => {
          const { brief, parts } = drawProblem(seededRandom(seed), circuit, MOST_COMBINATIONS);
          // A twin differs in nothing but its name, so every one of its fits is a tie.
          const twin = { ...parts[0], id: 900, partNumber: `A-${parts[0].partNumber}` };
          const all = hasTwin ? [...parts, twin] : parts;
          const allowed = all.filter(
            ({ polarity }) => brief.polarity === "either" || polarity === brief.polarity,
          );
          const expected = tryEveryCombination(plainBrief(brief, objective), allowed);
          const { fits } = await rankFits({ brief, objective, distinct: "none", limit }, all, SUPPLY);
          const values = (fit: Record<(typeof NAMES)[number], number>) => NAMES.map((name) => fit[name]);
          expect(fits.map((fit) => [fit.part.id, ...values(fit)])).toEqual(
            expected.slice(0, limit).map((fit) => [fit.partId, ...values(fit)]),
          );
        },
      ),
      { numRuns: 60 },
    );
  });
});
