import type { SeriesName } from "#shared/values/e-series";
import { seededRandom } from "../support/random";
import { requireAgreement } from "./agreement";
import { benchBrief, benchParts, combinationsOf, plainDevice, plainProblem, spreadOver } from "./cases";
import { timeExact } from "./exact";
import { drawUnits, type LoopObjective, PlainLoop } from "./loops";
import { runNumpy } from "./numpy";
import { median, type Report } from "./report";

const RUNS = 7;
/** Where one run takes longer than this, three must do. */
const LONG_MS = 5000;
const RUNS_WHERE_LONG = 3;
const SIZES = [200, 1000, 2000] as const;
const LOOP_PARTS = 40;
const NUMPY_SECONDS = 6;

const SERIES: Record<LoopObjective, readonly SeriesName[]> = {
  centred: ["E12", "E24", "E96"],
  assured: ["E24", "E96"],
};
/** How much of the space a loop is measured on, a run. */
const MEASURED: Record<LoopObjective, number> = { centred: 20e6, assured: 1.5e6 };
/** The least ratio of a loop's time to that of the exact search at 2,000 parts. */
const PLAIN_BARS: Record<LoopObjective, Partial<Record<SeriesName, number>>> = {
  centred: { E24: 20_000, E96: 500_000 },
  assured: { E24: 6000, E96: 150_000 },
};
const NUMPY_BARS: Record<LoopObjective, number> = { centred: 50_000, assured: 15_000 };
const GROWTH_BAR = 8;
const THREADS_BAR = 1.7;

/** Times of one case in ms. */
type Times = { oneThread: number; twoThreads: number };

/**
 * The exact search by one objective on one thread and on two, against the plain loop and NumPy, in one run; how it
 * grows with parts and with the series.
 *
 * @param withNumpy whether there is a NumPy to measure
 */
export async function benchSearch(
  report: Report,
  objective: LoopObjective,
  withNumpy: boolean,
): Promise<void> {
  await requireAgreement(objective, withNumpy);
  const times = new Map<string, Times>();
  for (const series of SERIES[objective]) {
    report.heading(`${objective}, ${series}, three decades for each resistor, 12 V, 10 kΩ`);
    for (const size of SIZES) {
      const measured = await timeSearch(report, objective, series, size);
      times.set(`${series} ${size}`, measured);
    }
    const { oneThread } = times.get(`${series} 2000`) as Times;
    comparePlain(report, objective, series, oneThread);
    if (withNumpy && series === "E24") compareNumpy(report, objective, oneThread);
  }
  report.heading(`${objective}: growth`);
  const at = (series: SeriesName, size: number) => times.get(`${series} ${size}`) as Times;
  for (const series of SERIES[objective]) {
    const growth = at(series, 2000).oneThread / at(series, 200).oneThread;
    const name = `${objective}, ${series}: time at 2,000 parts over time at 200`;
    if (series === "E12") report.figure(name, growth, "times");
    else report.bar(name, growth, GROWTH_BAR, "below");
  }
  const finer = at("E96", 2000).oneThread / at("E24", 2000).oneThread;
  report.bar(`${objective}, 2,000 parts: time of E96 over time of E24`, finer, GROWTH_BAR, "below");
  for (const series of ["E24", "E96"] as const) {
    const { oneThread, twoThreads } = at(series, 2000);
    const name = `${objective}, ${series}, 2,000 parts: two worker threads over one`;
    report.bar(name, oneThread / twoThreads, THREADS_BAR);
  }
}

/** One thread and two take turns, so that whatever else the machine does meets both alike. */
async function timeSearch(
  report: Report,
  objective: LoopObjective,
  series: SeriesName,
  size: number,
): Promise<Times> {
  const brief = benchBrief(series);
  const parts = benchParts(size);
  const one: number[] = [];
  const two: number[] = [];
  // Unmeasured: compiling, starting threads, and the ratios of the series, which the product keeps too.
  const first = await timeExact(brief, objective, parts, 2);
  const second = await timeExact(brief, objective, parts, 1);
  const runs = Math.max(first, second) > LONG_MS ? RUNS_WHERE_LONG : RUNS;
  for (let run = 0; run < runs; run++) {
    one.push(await timeExact(brief, objective, parts, 1));
    two.push(await timeExact(brief, objective, parts, 2));
  }
  const label = `${objective}, ${series}, ${size.toLocaleString("en-US")} parts`;
  report.figure(`${label}: combinations`, combinationsOf(plainProblem(brief)) * size, "");
  report.figure(`${label}: exact search, one thread`, median(one), "ms");
  report.figure(`${label}: exact search, two threads`, median(two), "ms");
  if (runs < RUNS) report.note(`${runs} runs only, as one takes longer than ${LONG_MS / 1000} s.`);
  return { oneThread: median(one), twoThreads: median(two) };
}

/** The plain loop over random pieces of the space at 2,000 parts, every piece other ones; its whole time is a rate's. */
function comparePlain(report: Report, objective: LoopObjective, series: SeriesName, exactMs: number): void {
  const problem = plainProblem(benchBrief(series));
  const parts = spreadOver(benchParts(2000), LOOP_PARTS);
  const random = seededRandom(1);
  const draw = (combinations: number) => drawUnits(random, problem, LOOP_PARTS, combinations);
  const rateOf = (corners: "all" | "until-none") => {
    const loop = new PlainLoop(objective, corners, problem, parts);
    // The bests this finds stay, so that what is measured runs as the middle of the whole loop would.
    loop.run(draw(3 * MEASURED[objective]));
    return median(Array.from({ length: RUNS }, () => loop.rate(draw(MEASURED[objective]))));
  };
  const combinations = combinationsOf(problem) * 2000;
  const label = `${objective}, ${series}, 2,000 parts`;
  const rate = rateOf("all");
  report.figure(`${label}: plain loop`, rate / 1e6, "M combinations/s");
  report.figure(`${label}: plain loop, extrapolated`, combinations / rate, "s");
  if (objective === "assured") {
    const hasty = rateOf("until-none");
    const ratio = combinations / hasty / (exactMs / 1000);
    report.note("Hasty: leaves a combination at its first corner without room, instead of solving all.");
    report.figure(`${label}: hasty plain loop`, hasty / 1e6, "M combinations/s");
    report.figure(`${label}: exact search, one thread, over hasty plain loop`, ratio, "times");
  }
  const name = `${label}: exact search, one thread, over plain loop`;
  const ratio = combinations / rate / (exactMs / 1000);
  const bar = PLAIN_BARS[objective][series];
  if (bar === undefined) report.figure(name, ratio, "times");
  else report.bar(name, ratio, bar);
}

/** NumPy over random pieces of the space at 2,000 parts, E24, on one thread. */
function compareNumpy(report: Report, objective: LoopObjective, exactMs: number): void {
  const problem = plainProblem(benchBrief("E24"));
  const devices = spreadOver(benchParts(2000), LOOP_PARTS).map(plainDevice);
  const pieces = { whole: false, seconds: NUMPY_SECONDS, roundSize: MEASURED[objective], seed: 1 };
  const task = { task: "search" as const, objective, problem, devices, ...pieces };
  const combinations = combinationsOf(problem) * 2000;
  const label = `${objective}, E24, 2,000 parts`;
  const over = (rate: number) => combinations / rate / (exactMs / 1000);
  const tell = (name: string, rate: number) => {
    report.figure(`${label}: ${name}`, rate / 1e6, "M combinations/s");
    report.figure(`${label}: exact search, one thread, over ${name}`, over(rate), "times");
  };
  const rate = median(runNumpy({ ...task, giveUp: false }).rates);
  report.figure(`${label}: NumPy`, rate / 1e6, "M combinations/s");
  report.figure(`${label}: NumPy, extrapolated`, combinations / rate, "s");
  report.bar(`${label}: exact search, one thread, over NumPy`, over(rate), NUMPY_BARS[objective]);
  if (objective === "assured") {
    tell("hasty NumPy", median(runNumpy({ ...task, giveUp: true }).rates));
  } else {
    const asItComes = runNumpy({ ...task, giveUp: false }, "as it comes");
    tell("NumPy with the usual memory settings", median(asItComes.rates));
  }
}
