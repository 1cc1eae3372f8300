import { benchBrief, benchParts, plainDevice, plainProblem } from "./cases";
import { rankExactly } from "./exact";
import { allUnits, type LoopObjective, PlainLoop } from "./loops";
import { runNumpy } from "./numpy";

const PARTS = 12;
/** What the last digits of float64 may do to a swing, nV. */
const ROUNDING = 2;

/**
 * Makes sure that all sides do the same work: on a small problem, the exact search, the plain loop and NumPy find the
 * same best for every part.
 *
 * @throws Error that names the part on which they differ
 */
export async function requireAgreement(objective: LoopObjective, withNumpy: boolean): Promise<void> {
  const brief = benchBrief("E3");
  // No rating may stand in the way, as the loops know none.
  brief.resistors.drain.min = 2200;
  const parts = benchParts(PARTS).map((part) => ({ ...part, pd25: 10, rthJa: 10 }));
  const problem = plainProblem(brief);
  const { candidates, parts: ranked } = await rankExactly(brief, objective, parts, 1);
  const exact = new Map(candidates.map((candidate) => [ranked[candidate.row].id, candidate]));
  const loops = (["all", "until-none"] as const).map((corners) => {
    const loop = new PlainLoop(objective, corners, problem, parts);
    loop.run(allUnits(problem, parts.length));
    return {
      name: "the plain loop",
      bests: loop.bests.map(({ bucket, nanovolts }) => [bucket, nanovolts] as const),
    };
  });
  if (withNumpy) {
    for (const giveUp of [false, true]) {
      const devices = parts.map(plainDevice);
      const search = { task: "search" as const, objective, giveUp, problem, devices };
      const { bests = [] } = runNumpy({ ...search, whole: true, seconds: 0, roundSize: 0, seed: 1 });
      loops.push({
        name: "NumPy",
        bests: bests.map(([bucket, nanovolts]) => [bucket ?? Infinity, nanovolts]),
      });
    }
  }
  parts.forEach(({ id, partNumber }, n) => {
    const found = exact.get(id);
    const swing = found ? -(objective === "centred" ? found.minor : found.major) : 0;
    for (const { name, bests } of loops) {
      const [bucket, nanovolts] = bests[n];
      const sameBucket = objective === "assured" || bucket === (found?.major ?? Number.POSITIVE_INFINITY);
      if (sameBucket && Math.abs(Math.max(0, nanovolts) - swing) <= ROUNDING) continue;
      const theirs = `${bucket} %, ${nanovolts} nV`;
      throw new Error(
        `For ${partNumber}, by ${objective}, ${name} finds ${theirs}, the search ${JSON.stringify(found)}.`,
      );
    }
  });
}
