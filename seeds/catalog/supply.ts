import type { Random } from "./random";
import type { Availability, Lifecycle } from "./records";

/** How the price falls: the share of the single-piece price that each quantity pays. */
export type PriceSteps = Readonly<Record<number, number>>;

/** Draws where a part stands in its life: four in five are active. */
export function drawLifecycle(random: Random): Lifecycle {
  return random.weighted<Lifecycle>([
    ["active", 80],
    ["not-recommended", 8],
    ["last-time-buy", 6],
    ["obsolete", 6],
  ]);
}

/** What a part's place in its life does to its price, as a factor. */
export const lifecyclePriceFactor: Readonly<Record<Lifecycle, number>> = {
  active: 1,
  "not-recommended": 1.1,
  "last-time-buy": 1.4,
  obsolete: 2,
};

/**
 * Draws what is on the shelf and how long more would take.
 * No more obsolete parts are made: they carry 52 weeks, longer than any other, and what a few drawers still hold.
 */
export function drawAvailability(random: Random, lifecycle: Lifecycle): Availability {
  switch (lifecycle) {
    case "active":
      return {
        stock: random.chance(0.08) ? 0 : Math.round(random.logBetween(150, 40_000)),
        leadTimeWeeks: random.whole(2, 18),
      };
    case "not-recommended":
      return {
        stock: random.chance(0.1) ? 0 : Math.round(random.logBetween(50, 6_000)),
        leadTimeWeeks: random.whole(8, 26),
      };
    case "last-time-buy":
      return {
        stock: random.chance(0.1) ? 0 : Math.round(random.logBetween(100, 10_000)),
        leadTimeWeeks: random.whole(16, 40),
      };
    case "obsolete":
      return { stock: random.chance(0.35) ? 0 : Math.round(random.logBetween(5, 400)), leadTimeWeeks: 52 };
  }
}

/**
 * Prices at each quantity, in whole cents, never below one and never rising.
 *
 * @param single what the first step's share of 1 costs, cents (of one piece or of a thousand)
 */
export function priceLadder(single: number, steps: PriceSteps): { quantity: number; cents: number }[] {
  return Object.entries(steps).map(([quantity, share]) => ({
    quantity: Number(quantity),
    cents: Math.max(1, Math.round(single * share)),
  }));
}
