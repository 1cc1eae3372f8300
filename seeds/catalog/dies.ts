import type { Polarity } from "#shared/schemas/quantity";
import { significant } from "./figures";
import { type Kind, type KindName, kinds } from "./kinds";
import type { Grade, Maker } from "./makers";
import type { Random } from "./random";

/** One design in silicon; a maker sells it in several packages and, sorted, in several threshold grades. */
export interface Die {
  maker: Maker;
  number: number;
  kind: Kind;
  polarity: Polarity;
  /** Area, as the K that an N-channel low-voltage die of the same area would have, A/V². */
  size: number;
  k: number;
  kSpread: number;
  vt: number;
  /** Greatest threshold over least, unsorted. */
  vtRatio: number;
  tcVt: number;
  vdss: number;
  vgss: number;
  lambda: number;
  ciss: number;
  coss: number;
  crss: number;
  grades: readonly Grade[];
}

/** Holes move about half as freely as electrons. */
const polarityFactor: Record<Polarity, number> = { n: 1, p: 0.5 };

/**
 * Draws one die of a maker's.
 *
 * @param number the die's number among the maker's of this polarity, from 1
 */
export function drawDie(
  random: Random,
  maker: Maker,
  name: KindName,
  polarity: Polarity,
  number: number,
): Die {
  const kind = kinds[name];
  const vdss = random.weighted(kind.vdss.filter(([volts]) => volts <= maker.vdssLimit));
  const size = random.logBetween(kind.size[0], kind.size[1]);
  // Above some 60 V the cells grow with the rating, so the same area holds less channel.
  const k = significant(size * polarityFactor[polarity] * Math.sqrt(60 / Math.max(60, vdss)), 2);
  // Thin gate oxides and low thresholds come with low drain ratings.
  const thresholds = kind.thresholds.filter((volts) => vdss < 80 || Math.abs(volts) >= 1.2);
  const vt = random.weighted(thresholds.map((volts) => [volts, 1] as const)) * random.between(0.95, 1.05);
  const ciss = 1e-12 + 25e-12 * (size / 0.02) ** 0.74 * (60 / vdss) ** 0.2 * random.between(0.85, 1.15);
  const coss = 0.5e-12 + ciss * 0.4 * Math.min(1.6, (40 / vdss) ** 0.6) * random.between(0.85, 1.15);
  const crss = coss * random.between(0.18, 0.36);
  return {
    maker,
    number,
    kind,
    polarity,
    size,
    k,
    kSpread: random.between(0.35, 0.46),
    vt,
    vtRatio: random.between(2.2, 2.85),
    // Higher thresholds come with thicker oxides, which drift more.
    tcVt: -significant(
      Math.min(5e-3, Math.max(2e-3, (1.5 + Math.abs(vt)) * 1e-3 * random.between(0.85, 1.15))),
      2,
    ),
    vdss,
    vgss: drawGateLimit(random, vt, vdss),
    lambda: significant(
      Math.min(0.03, Math.max(0.002, 0.03 * (12 / vdss) ** 0.75 * random.between(0.85, 1.1))),
      2,
    ),
    ciss: significant(ciss, 2),
    coss: significant(coss, 2),
    crss: significant(crss, 2),
    grades: random.weighted<readonly Grade[]>([
      [[0], 60],
      [[0, 1], 22],
      [[0, 1, 2], 9],
      [[1, 2], 9],
    ]),
  };
}

function drawGateLimit(random: Random, vt: number, vdss: number): number {
  if (vdss >= 80 || vt < 0) return 20;
  if (vt < 0.8) return vdss <= 30 && random.chance(0.6) ? 8 : 12;
  if (vt < 1.8) return random.chance(0.6) ? 12 : 20;
  return random.chance(0.8) ? 20 : 30;
}
