import { afterAll, describe, expect, it } from "vitest";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import { CIRCUITS } from "#shared/schemas/circuit";
import { OBJECTIVES } from "#shared/schemas/fits";
import { closePool } from "../../api/ranking/pool";
import { rankFits } from "../../api/ranking/rank-fits";
import { seededRandom } from "../support/random";
import { drawProblem, SUPPLY } from "./problems";

const BRIEFS = 50;

afterAll(closePool);

/** Limits that no stage meets, one at a time, as dotted path and value. */
const OUT_OF_REACH: [string, number][] = [
  ["swing.peak", 400],
  ["gain.min", 1e6],
  ["inputResistance.min", 90e6],
  ["supplyCurrent.max", 1e-9],
  ["sourceDrop.min", 400],
];

function withLimit(brief: Brief, path: string, value: number | undefined): Brief {
  const [group, field] = path.split(".") as [keyof Brief, string];
  return briefSchema.parse({ ...brief, [group]: { ...(brief[group] as object), [field]: value } });
}

/** A brief of a circuit that something fits, the distortion and greatest gain left open so that one limit decides. */
async function drawFeasible(seed: number, circuit: (typeof CIRCUITS)[number]) {
  for (let attempt = 0; ; attempt++) {
    const { brief, parts } = drawProblem(seededRandom(1000 * seed + attempt), circuit);
    const open = { ...brief, gain: {}, distortion: {}, highCorner: {}, sourceDrop: {} };
    const { fits } = await rankFits(
      { brief: open, objective: "centred", distinct: "part", limit: 1 },
      parts,
      SUPPLY,
    );
    if (fits.length > 0) return { brief: open, parts };
  }
}

describe("a brief that no part meets", () => {
  for (let seed = 1; seed <= BRIEFS; seed++) {
    const circuit = CIRCUITS[seed % CIRCUITS.length];
    const [path, value] = OUT_OF_REACH[seed % OUT_OF_REACH.length];
    it(`says what to relax, and that helps: random brief ${seed}, ${circuit}, ${path}`, async () => {
      const { brief, parts } = await drawFeasible(seed, circuit);
      const strict = withLimit(brief, path, value);
      const objective = OBJECTIVES[seed % 2];
      const request = { objective, distinct: "part", limit: 10 } as const;
      const answer = await rankFits({ brief: strict, ...request }, parts, SUPPLY);
      expect(answer.fits).toEqual([]);
      expect(answer.relax?.path).toBe(path);
      // A condition that can't be met by any value is to be dropped, and states none.
      if (answer.relax?.needed !== null) expect(answer.relax?.stated).toBe(value);
      const eased = withLimit(strict, path, answer.relax?.needed ?? undefined);
      const { fits } = await rankFits({ brief: eased, ...request }, parts, SUPPLY);
      expect(fits.length).toBeGreaterThan(0);
    });
  }
});
