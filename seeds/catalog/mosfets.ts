import { type Die, drawDie } from "./dies";
import { evenlyRounded, significant, significantDown } from "./figures";
import { type KindName, kinds } from "./kinds";
import { type Grade, type Maker, makers } from "./makers";
import { type PackageName, packageNames, packages } from "./packages";
import { createRandom, type Random } from "./random";
import type { MosfetRecord } from "./records";
import {
  drawAvailability,
  drawLifecycle,
  lifecyclePriceFactor,
  type PriceSteps,
  priceLadder,
} from "./supply";

/** Chosen, among many, for a catalog in which most part numbers of the design drawings occur. */
const catalogSeed = 29461;

/** The gate voltage at which a datasheet rates the current, V, by the gate's own limit. */
const driveVoltage: Record<number, number> = { 8: 4.5, 12: 8, 20: 10, 30: 10 };

const surfaceSteps: readonly PriceSteps[] = [
  { 1: 1, 10: 0.72, 100: 0.45, 500: 0.36, 1000: 0.28, 10000: 0.18 },
  { 1: 1, 10: 0.75, 100: 0.42, 1000: 0.27, 3000: 0.22 },
];
const leadedSteps: readonly PriceSteps[] = [
  { 1: 1, 10: 0.8, 100: 0.55, 500: 0.45, 1000: 0.38 },
  { 1: 1, 25: 0.75, 100: 0.56, 1000: 0.4 },
];

/** Invents the whole MOSFET catalog, the same each time, by maker and then part number. */
export function inventMosfets(seed: number = catalogSeed): MosfetRecord[] {
  const random = createRandom(seed);
  const foundry = { n: new Map<Maker, number>(), p: new Map<Maker, number>() };
  const listed = { n: new Map<Maker, number>(), p: new Map<Maker, number>() };
  const records: MosfetRecord[] = [];

  for (const polarity of ["n", "p"] as const) {
    for (const name of Object.keys(kinds) as KindName[]) {
      let wanted = kinds[name].parts[polarity];
      while (wanted > 0) {
        const maker = random.weighted(makers.map((each) => [each, each.makes[name] ?? 0] as const));
        const die = drawDie(random, maker, name, polarity, countUp(foundry[polarity], maker));
        for (const [outline, grade] of drawVariants(random, die).slice(0, wanted)) {
          records.push(buildPart(random, die, outline, grade, countUp(listed[polarity], maker)));
          wanted -= 1;
        }
      }
    }
  }
  const rank = new Map(makers.map((maker, index) => [maker.name, index]));
  return records.sort(
    (a, b) => rank.get(a.maker)! - rank.get(b.maker)! || (a.partNumber < b.partNumber ? -1 : 1),
  );
}

function countUp(counts: Map<Maker, number>, maker: Maker): number {
  const next = (counts.get(maker) ?? 0) + 1;
  counts.set(maker, next);
  return next;
}

/** Two to four packages that hold the die and stand its voltage, each in every grade. */
function drawVariants(random: Random, die: Die): [PackageName, Grade][] {
  const fitting = packageNames.filter(
    (name) =>
      die.kind.packages.includes(name) &&
      die.maker.packages.includes(name) &&
      packages[name].largestDie >= die.size &&
      packages[name].leadVoltage >= die.vdss,
  );
  const surplus = fitting.length - random.whole(2, 4);
  for (let dropped = 0; dropped < surplus; dropped += 1)
    fitting.splice(random.whole(0, fitting.length - 1), 1);
  return fitting.flatMap((name) => die.grades.map((grade): [PackageName, Grade] => [name, grade]));
}

function buildPart(
  random: Random,
  die: Die,
  outline: PackageName,
  grade: Grade,
  listed: number,
): MosfetRecord {
  const { mounting } = packages[outline];
  const rthJa = thermalResistance(random, die, outline);
  const pd25 = significantDown((die.kind.tjMax - 25) / rthJa, 2);
  const lifecycle = drawLifecycle(random);
  const steps = mounting === "surface" ? surfaceSteps : leadedSteps;
  const { polarity, vdss } = die;
  return {
    partNumber: die.maker.number({ polarity, die: die.number, listed, package: outline, vdss, grade }),
    maker: die.maker.name,
    polarity,
    package: outline,
    mounting,
    ...thresholdRange(die, grade),
    kMin: evenlyRounded(die.k * (1 - die.kSpread)),
    kTyp: die.k,
    kMax: evenlyRounded(die.k * (1 + die.kSpread)),
    lambda: die.lambda,
    tcVt: die.tcVt,
    ciss: die.ciss,
    coss: die.coss,
    crss: die.crss,
    vdss,
    vgss: die.vgss,
    idMax: currentRating(die, outline, pd25),
    pd25,
    rthJa,
    tjMax: die.kind.tjMax,
    lifecycle,
    ...drawAvailability(random, lifecycle),
    priceBreaks: priceLadder(
      singlePrice(die, outline, grade) * lifecyclePriceFactor[lifecycle] * random.between(0.92, 1.08),
      steps[random.whole(0, steps.length - 1)],
    ).map(({ quantity, cents }) => ({ quantity, unitPrice: cents })),
  };
}

/** A sorted part keeps the lower or the upper two thirds of the die's own range. */
function thresholdRange(die: Die, grade: Grade): Pick<MosfetRecord, "vtMin" | "vtTyp" | "vtMax"> {
  const lowest = (Math.abs(die.vt) * 2) / (1 + die.vtRatio);
  const highest = lowest * die.vtRatio;
  const kept = 0.68 * (highest - lowest);
  const from = grade === 2 ? highest - kept : lowest;
  const to = grade === 1 ? lowest + kept : highest;
  const [least, typical, greatest] = [from, (from + to) / 2, to].map((volts) => significant(volts, 2));
  return die.vt > 0
    ? { vtMin: least, vtTyp: typical, vtMax: greatest }
    : { vtMin: -greatest, vtTyp: -typical, vtMax: -least };
}

/** K/W in still air: a larger die spreads its heat better. */
function thermalResistance(random: Random, die: Die, outline: PackageName): number {
  const { rthJa, largestDie } = packages[outline];
  const [least] = kinds.array.size;
  const share = Math.log(die.size / least) / Math.log(largestDie / least);
  const drawn =
    rthJa.smallestDie +
    (rthJa.largestDie - rthJa.smallestDie) * Math.min(1, share * random.between(0.9, 1.1));
  const step = drawn >= 100 ? 5 : 1;
  return Math.round(drawn / step) * step;
}

/** Continuous drain current, A: the least of what the channel gives, what the heat allows and what the leads carry. */
function currentRating(die: Die, outline: PackageName, pd25: number): number {
  const overdrive = driveVoltage[die.vgss] - die.vt;
  const channel = 0.8 * die.k * overdrive ** 2;
  // The lightly doped drain adds resistance that grows with the voltage it must hold; half as much again when hot.
  const onResistance = (1.5 * (1 + (die.vdss / 100) ** 1.3)) / (2 * die.k * overdrive);
  const thermal = Math.sqrt(pd25 / onResistance);
  return significantDown(Math.min(channel, thermal, packages[outline].leadCurrent), 2);
}

/** US cents for one piece: the package, the silicon in it, and what sorting or a rare process adds. */
function singlePrice(die: Die, outline: PackageName, grade: Grade): number {
  const silicon = 34 * die.size ** 0.62 * Math.max(1, die.vdss / 60) ** 0.4;
  const sorting = grade === 0 ? 1 : 1.12;
  return (packages[outline].cents + silicon) * die.kind.priceFactor * die.maker.priceFactor * sorting;
}
