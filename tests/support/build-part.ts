import type { Part } from "#shared/schemas/part";
import { type Random, significant } from "./random";

/** A plausible small-signal part; a test names only what matters to it. */
export function buildPart(overrides: Partial<Part> = {}): Part {
  return {
    id: 1,
    partNumber: "TEST-N1",
    maker: "Test Row",
    polarity: "n",
    package: "SOT-23",
    mounting: "surface",
    vtMin: 0.8,
    vtTyp: 1.2,
    vtMax: 1.8,
    kMin: 6e-3,
    kTyp: 10e-3,
    kMax: 14e-3,
    lambda: 0.01,
    tcVt: -2e-3,
    ciss: 30e-12,
    coss: 12e-12,
    crss: 4e-12,
    vdss: 60,
    vgss: 20,
    idMax: 0.2,
    pd25: 0.35,
    rthJa: 350,
    tjMax: 150,
    lifecycle: "active",
    stock: 1000,
    leadTimeWeeks: 6,
    priceBreaks: [
      { quantity: 1, unitPrice: 30 },
      { quantity: 100, unitPrice: 12 },
    ],
    ...overrides,
  };
}

/** Parts drawn at random over the range of discretes, half of them without channel-length modulation. */
export function randomParts(random: Random, count: number): Part[] {
  return Array.from({ length: count }, (_, index) => {
    const vtTyp = significant(random.between(0.5, 3.5));
    const kTyp = significant(random.logBetween(2e-4, 0.2));
    const crss = significant(random.between(1e-12, 8e-12));
    return buildPart({
      id: index + 1,
      partNumber: `TEST-${String.fromCharCode(65 + ((index * 7) % 26))}${index}`,
      polarity: random.pick(["n", "p"] as const),
      vtMin: significant(vtTyp * 0.7),
      vtTyp,
      vtMax: significant(vtTyp * 1.4),
      kMin: significant(kTyp * 0.6),
      kTyp,
      kMax: significant(kTyp * 1.4),
      lambda: random.chance(0.5) ? 0 : significant(random.between(0.002, 0.03)),
      crss,
      ciss: significant(crss * random.between(4, 10)),
      coss: significant(crss * random.between(1.5, 4)),
      vdss: random.pick([20, 30, 60, 100]),
      pd25: significant(random.between(0.1, 1)),
      priceBreaks: [
        { quantity: 1, unitPrice: random.whole(20, 60) },
        { quantity: 100, unitPrice: random.whole(8, 15) },
      ],
    });
  });
}
