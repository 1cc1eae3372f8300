import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type ResistorKey, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { type SeriesName, stepInSeries, valuesBetween } from "#shared/values/e-series";
import { circuitOf } from "../circuits/registry";
import { assuredSwing, boxOf } from "../spread";
import { figureStage, type StageFigures, stageValues } from "../stage-sheet";
import { requiredMargins } from "./margins";

/** One resistor's other value that would better the stage, everything else kept. */
export type BetterValue = {
  resistor: ResistorKey;
  /** Ohms. */
  value: number;
  /** Where the value is from: the brief's own series for the resistor, or the finer one. */
  series: SeriesName;
  isRelaxed: boolean;
  improves: "centring" | "assured";
  /** What these would become: the centring error as a fraction, the assured swing in V. */
  centringError: number;
  assured: number;
};

/** The series to look in where the brief's own has nothing better. It holds E96 as well. */
const FINER: SeriesName = "E192";
/** A gain below a tenth of a percentage point doesn't show on the sheet, and is far below what tolerances do. */
const LEAST_GAIN = 1e-3;
/** The assured swing must grow by this share to be worth a step. */
const LEAST_SHARE = 0.01;
/** Bounds of a range hold to float noise. */
const NOISE = 1e-9;

/**
 * At most one better value a resistor: those that centre the stage first, the least centring error before others, then
 * those that only raise the assured swing, the greatest first. For each resistor, in this order of preference: the step
 * of the brief's own series that lowers the centring error most; the value of E192 nearest to the present one, between
 * its neighbours in the brief's own series, that lowers it; the step of the brief's own series that raises the assured
 * swing most. Values stay in the brief's ranges, and no condition that is met now is missed with them. What is in stock
 * and what the resistors may dissipate is not looked at.
 */
export function betterValues(part: Part, brief: Brief, resistors: Resistors): BetterValue[] {
  const stage = { part, brief, resistors };
  const present = figuresWith(stage, resistors);
  const now = {
    centringError: present.bias.centringError ?? 1,
    assured: assuredWith(stage, resistors),
    missed: missedBy(stage, present),
  };
  return RESISTOR_KEYS.filter((key) => resistors[key] > 0)
    .flatMap((key) => betterValueOf(stage, now, key) ?? [])
    .sort(byImprovement);
}

type Stage = { part: Part; brief: Brief; resistors: Resistors };
type Now = { centringError: number; assured: number; missed: ReadonlySet<string> };

function betterValueOf(stage: Stage, now: Now, resistor: ResistorKey): BetterValue | null {
  const { brief, resistors } = stage;
  const { series, min, max } = brief.resistors[circuitOf(brief.circuit).ranges[resistor] ?? "divider"];
  const own = resistors[resistor];
  const lower = stepInSeries(series, own, -1);
  const higher = stepInSeries(series, own, 1);
  const tryOut = (value: number) => {
    const figures = figuresWith(stage, { ...resistors, [resistor]: value });
    return { value, figures, centringError: figures.bias.centringError ?? 1 };
  };
  type Trial = ReturnType<typeof tryOut>;
  const keepsConditions = ({ figures }: Trial) =>
    [...missedBy(stage, figures)].every((condition) => now.missed.has(condition));
  const centres = (trial: Trial) =>
    trial.centringError <= now.centringError - LEAST_GAIN && keepsConditions(trial);
  const assuredOf = ({ value }: Trial) => assuredWith(stage, { ...resistors, [resistor]: value });
  const suggest = (trial: Trial, improves: BetterValue["improves"], from = series): BetterValue => ({
    resistor,
    value: trial.value,
    series: from,
    isRelaxed: from !== series,
    improves,
    centringError: trial.centringError,
    assured: assuredOf(trial),
  });

  const steps = [lower, higher]
    .filter((value) => value >= min * (1 - NOISE) && value <= max * (1 + NOISE))
    .map(tryOut);
  const [step] = steps.filter(centres).sort((a, b) => a.centringError - b.centringError);
  if (step) return suggest(step, "centring");

  const nearest = valuesBetween(FINER, Math.max(lower, min), Math.min(higher, max))
    .filter((value) => ![lower, own, higher].includes(value))
    .sort((a, b) => Math.abs(Math.log(a / own)) - Math.abs(Math.log(b / own)));
  for (const value of nearest) {
    const trial = tryOut(value);
    if (centres(trial)) return suggest(trial, "centring", FINER);
  }

  const [raised] = steps
    .filter((trial) => assuredOf(trial) > (1 + LEAST_SHARE) * now.assured && keepsConditions(trial))
    .map((trial) => suggest(trial, "assured"))
    .sort((a, b) => b.assured - a.assured);
  return raised ?? null;
}

function byImprovement(a: BetterValue, b: BetterValue): number {
  if (a.improves !== b.improves) return a.improves === "centring" ? -1 : 1;
  return a.improves === "centring" ? a.centringError - b.centringError : b.assured - a.assured;
}

const figuresWith = ({ part, brief }: Stage, resistors: Resistors) => figureStage(part, brief, resistors);

function assuredWith({ part, brief }: Stage, resistors: Resistors): number {
  return assuredSwing(boxOf(part, brief, stageValues(brief, resistors))).swing.symmetric;
}

/** The conditions that a stage misses; saturation is one. */
function missedBy({ part, brief }: Stage, figures: StageFigures): ReadonlySet<string> {
  const missed = requiredMargins(part, brief, figures).filter(({ margin }) => margin < 0);
  const names = missed.map(({ condition, bound }) => `${condition} ${bound}`);
  return new Set(figures.bias.region === "saturation" ? names : [...names, "saturation"]);
}
