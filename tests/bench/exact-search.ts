import { type Brief, briefSchema } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import type { SeriesName } from "#shared/values/e-series";
import { buildCatalog, compareParts } from "../../api/ranking/catalog";
import { combinationsPerPart, compileProblem, type Problem } from "../../api/ranking/problem";
import { rankParts } from "../../api/ranking/rank-parts";
import { BestCandidates } from "../../api/ranking/search/order";
import { buildRatioTable } from "../../api/ranking/search/ratio-table";
import { Search } from "../../api/ranking/search/search-part";
import { randomParts } from "../support/build-part";
import { seededRandom } from "../support/random";
import { runPlainLoop } from "./plain-centred";
import { median, type Report } from "./report";

const RUNS = 7;
const CATALOG_SIZES = [200, 1000, 2000] as const;
const SERIES = ["E12", "E24", "E96"] as const satisfies readonly SeriesName[];
const PLAIN_COMBINATIONS = 20e6;
const SUPPLY = { rating: 1, stocked: null };

/** 12 V, 10 kΩ, three decades for each resistor: the working case. */
function benchBrief(series: SeriesName): Brief {
  const range = (min: number, max: number) => ({ series, min, max });
  return briefSchema.parse({
    polarity: "either",
    rail: { volts: 12 },
    load: { ohms: 10e3 },
    resistors: { divider: range(10e3, 10e6), drain: range(100, 100e3), source: range(10, 10e3) },
  });
}

/** The exact search of every part on this thread, ratio table and all. */
function searchHere(problem: Problem, parts: readonly Part[]): number {
  const started = performance.now();
  const search = new Search(problem, buildRatioTable(problem.divider));
  const catalog = buildCatalog(parts);
  for (let row = 0; row < parts.length; row++) search.part(catalog, row, new BestCandidates(1));
  return performance.now() - started;
}

/** The exact search against the plain loop, in one process, at three catalog sizes and three series. */
export async function benchExactSearch(report: Report): Promise<void> {
  const catalog = randomParts(seededRandom(2026), Math.max(...CATALOG_SIZES)).map((part) => ({
    ...part,
    vdss: 60,
  }));
  const medians = new Map<string, number>();
  for (const series of SERIES) {
    report.heading(`centred, ${series}, three decades for each resistor, 12 V, 10 kΩ`);
    const brief = benchBrief(series);
    const problem = compileProblem(brief, SUPPLY);
    for (const size of CATALOG_SIZES) {
      const parts = catalog.slice(0, size).sort(compareParts);
      const devices = parts.map(({ vtTyp, kTyp, lambda }) => ({ vt: vtTyp, k: kTyp, lambda }));
      const combinations = combinationsPerPart(problem) * size;
      const plain: number[] = [];
      const exact: number[] = [];
      const pooled: number[] = [];
      const control = () => ({ deadline: Date.now() + 600_000 });
      const request = { brief, distinct: "part" as const, limit: 100 };
      // Once unmeasured, so that neither side is timed while it is being compiled.
      await rankParts(request, parts, SUPPLY, control());
      for (let run = 0; run < RUNS; run++) {
        const loop = runPlainLoop(problem as typeof problem & { load: number }, devices, PLAIN_COMBINATIONS);
        plain.push((loop.elapsedMs / loop.solved) * combinations);
        exact.push(searchHere(problem, parts));
        const started = performance.now();
        await rankParts(request, parts, SUPPLY, control());
        pooled.push(performance.now() - started);
      }
      const label = `${series}, ${size.toLocaleString("en-US")} parts`;
      medians.set(`${series} ${size}`, median(exact));
      report.figure(`${label}: combinations`, combinations, "");
      report.figure(`${label}: plain loop, extrapolated`, median(plain) / 1000, "s");
      report.figure(`${label}: exact search, one thread`, median(exact), "ms");
      report.figure(`${label}: exact search, worker threads`, median(pooled), "ms");
      report.figure(`${label}: plain loop over exact search`, median(plain) / median(exact), "times");
    }
  }
  const at = (key: string) => medians.get(key) ?? Number.NaN;
  report.heading("Growth");
  for (const series of SERIES) {
    report.figure(
      `${series}: time at 2,000 parts over 200`,
      at(`${series} 2000`) / at(`${series} 200`),
      "times",
    );
  }
  report.figure("2,000 parts: time of E96 over E24", at("E96 2000") / at("E24 2000"), "times");
}
