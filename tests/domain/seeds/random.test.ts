import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createRandom } from "../../../seeds/catalog/random";

const seed = fc.integer({ min: 0, max: 2 ** 32 - 1 });

describe("the seeded generator", () => {
  it("repeats itself from the same seed", () => {
    fc.assert(
      fc.property(seed, (from) => {
        const [one, other] = [createRandom(from), createRandom(from)];
        for (let i = 0; i < 20; i += 1) expect(one.unit()).toBe(other.unit());
      }),
    );
  });

  it("fills [0, 1) evenly: each tenth of a hundred thousand draws within 3 %", () => {
    const random = createRandom(7);
    const tenths = new Array<number>(10).fill(0);
    for (let i = 0; i < 100_000; i += 1) tenths[Math.floor(random.unit() * 10)] += 1;
    for (const count of tenths) expect(Math.abs(count - 10_000)).toBeLessThan(300);
  });

  it("draws inside what it is asked for", () => {
    fc.assert(
      fc.property(seed, (from) => {
        const random = createRandom(from);
        for (let i = 0; i < 20; i += 1) {
          expect([3, 4, 5]).toContain(random.whole(3, 5));
          const spread = random.logBetween(0.01, 10);
          expect(spread >= 0.01 && spread < 10).toBe(true);
          expect(
            random.weighted([
              ["never", 0],
              ["always", 2],
            ]),
          ).toBe("always");
        }
      }),
    );
  });
});
