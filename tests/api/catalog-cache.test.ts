import { eq } from "drizzle-orm";
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { briefSchema } from "#shared/schemas/brief";
import { catalogVersions } from "../../api/db/schema/catalog";
import { resistorOrderables } from "../../api/db/schema/orderables";
import { parts } from "../../api/db/schema/parts";
import { catalogChanged, readKept } from "../../api/features/catalog/service";
import { resistorSupply } from "../../api/features/orderables/service";
import { selectAllParts } from "../../api/features/parts/queries";
import { usableParts } from "../../api/features/parts/service";
import type { SignedInContext } from "../../api/http/context";
import { SMALL_BRIEF, startTestApi, type TestApi, type TestTeam } from "../support/api";

let api: TestApi;
let tidewater: TestTeam;
let lantern: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  tidewater = await api.addTeam("tidewater");
  lantern = await api.addTeam("lantern");
});
afterAll(() => api.stop());

/** A new request's context, as a designer of a team has it. */
function contextOf({ id, name }: TestTeam): SignedInContext {
  const email = `designer@${name}.example`;
  return {
    ...api.surroundings,
    requestId: "test",
    address: "127.0.0.1",
    actor: {
      sessionId: "test",
      user: { id: email, email, name: "The designer" },
      team: { id, name },
      roles: ["designer"],
    },
  };
}

const resistor = (overrides: Partial<typeof resistorOrderables.$inferInsert>) => ({
  orderableNumber: "R-1",
  maker: "Test Row",
  tolerance: 0.01,
  size: "0603",
  voltageRating: 75,
  stock: 100,
  leadTimeWeeks: 4,
  priceBreaks: [{ quantity: 1, centsPerThousand: 1500 }],
  family: "thick film" as const,
  series: "E24" as const,
  ohms: 2700,
  powerRating: 0.1,
  ppmPerKelvin: 100,
  ...overrides,
});

/** Changes something without a word, or tells the catalog whose it was. */
const tell = (teamId: number | null) =>
  api.db.transaction((transaction) => catalogChanged(transaction, teamId));
const numbersOf = async (team: TestTeam) =>
  (await usableParts(contextOf(team))).map(({ partNumber }) => partNumber).sort();

beforeEach(async () => {
  await api.addPart({ partNumber: "SHARED-1" });
  await api.addPart({ partNumber: "OWN-1" }, tidewater.id);
  for (const teamId of [null, tidewater.id, lantern.id]) await tell(teamId);
});
afterEach(async () => {
  await api.db.delete(parts);
  await api.db.delete(resistorOrderables);
});

describe("the parts a team may use", () => {
  it("come from memory until a change is told", async () => {
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "SHARED-1"]);
    await api.addPart({ partNumber: "SHARED-2" });
    await api.addPart({ partNumber: "OWN-2" }, tidewater.id);
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "SHARED-1"]);
    await tell(tidewater.id);
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "OWN-2", "SHARED-1"]);
    await tell(null);
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "OWN-2", "SHARED-1", "SHARED-2"]);
  });

  it("are the same as the database gives, field by field", async () => {
    const byId = (a: { id: number }, b: { id: number }) => a.id - b.id;
    for (let time = 0; time < 2; time++) {
      const found = await usableParts(contextOf(tidewater));
      expect([...found].sort(byId)).toEqual((await selectAllParts(api.db, tidewater.id)).sort(byId));
    }
  });

  it("never hold another team's own, whoever asks first", async () => {
    await api.addPart({ partNumber: "LANTERN-1" }, lantern.id);
    // Versions that are alike, so that only the team tells what is kept apart.
    await api.db.update(catalogVersions).set({ version: 1000 });
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "SHARED-1"]);
    expect(await numbersOf(lantern)).toEqual(["LANTERN-1", "SHARED-1"]);
    await tell(null);
    expect(await numbersOf(lantern)).toEqual(["LANTERN-1", "SHARED-1"]);
    expect(await numbersOf(tidewater)).toEqual(["OWN-1", "SHARED-1"]);
  });

  it("stay as they were when the change is rolled back, and its telling with it", async () => {
    const before = await usableParts(contextOf(tidewater));
    const refused = new Error("refused");
    const change = api.db.transaction(async (transaction) => {
      await transaction.update(parts).set({ stock: 4711 }).where(eq(parts.partNumber, "OWN-1"));
      await catalogChanged(transaction, tidewater.id);
      throw refused;
    });
    await expect(change).rejects.toBe(refused);
    const after = await usableParts(contextOf(tidewater));
    expect(after.map((part, index) => part === before[index])).toEqual([true, true]);
  });

  it("are told apart by every one of many changes at a time", async () => {
    await Promise.all(Array.from({ length: 8 }, () => tell(tidewater.id)));
    await api.addPart({ partNumber: "OWN-2" }, tidewater.id);
    await tell(tidewater.id);
    expect(await numbersOf(tidewater)).toContain("OWN-2");
  });
});

describe("what resistors cost", () => {
  const brief = briefSchema.parse({ ...SMALL_BRIEF, buildQuantity: 250 });
  const pricesFor = async (team: TestTeam, change: object = {}) =>
    (await resistorSupply(contextOf(team), { ...brief, ...change })).prices;

  it("is in whole cents for the build, at the deepest break reached, the cheapest of a size", async () => {
    const priceBreaks = [
      { quantity: 1, centsPerThousand: 1500 },
      { quantity: 100, centsPerThousand: 481 },
      { quantity: 1000, centsPerThousand: 300 },
    ];
    await api.db
      .insert(resistorOrderables)
      .values([
        resistor({ orderableNumber: "LARGE", size: "0805", powerRating: 0.125, voltageRating: 150 }),
        resistor({ orderableNumber: "DEAR", priceBreaks: [{ quantity: 1, centsPerThousand: 900 }] }),
        resistor({ orderableNumber: "CHEAP", priceBreaks }),
        resistor({ orderableNumber: "UNPRICED", ohms: 3300, priceBreaks: [] }),
      ]);
    await tell(null);
    const prices = await pricesFor(tidewater);
    // 250 × 481 / 1000 = 120.25; 250 × 1500 / 1000 = 375.
    expect(prices.get(2700)?.[0]).toEqual({ power: 0.1, voltage: 75, lineCents: 120 });
    expect(prices.get(2700)?.at(-1)).toEqual({ power: 0.125, voltage: 150, lineCents: 375 });
    expect(prices.has(3300)).toBe(false);
    // 7 × 1500 / 1000 = 10.5 is rounded to 11, but the dearer of the two asks 6.3 for seven, which is 6.
    const few = await pricesFor(tidewater, { buildQuantity: 7 });
    expect(few.get(2700)?.map(({ lineCents }) => lineCents)).toEqual([6, 11, 11]);
  });

  it("counts only what is within the tolerance, and in stock where that is asked", async () => {
    await api.db
      .insert(resistorOrderables)
      .values([
        resistor({ orderableNumber: "WIDE", tolerance: 0.05, ohms: 1000 }),
        resistor({ orderableNumber: "TIGHT", tolerance: 0.001, ohms: 2200 }),
        resistor({ orderableNumber: "GONE", stock: 0, ohms: 4700 }),
      ]);
    await tell(null);
    expect([...(await pricesFor(tidewater)).keys()].sort()).toEqual([2200, 4700]);
    const stocked = { resistors: { ...brief.resistors, stockedOnly: true } };
    expect([...(await pricesFor(tidewater, stocked)).keys()]).toEqual([2200]);
    const wide = { resistors: { ...brief.resistors, tolerance: 0.05 } };
    expect([...(await pricesFor(tidewater, wide)).keys()].sort()).toEqual([1000, 2200, 4700]);
  });

  it("is read once for all teams, and anew once the shared catalog has changed", async () => {
    await api.db.insert(resistorOrderables).values(resistor({}));
    await tell(null);
    const first = await pricesFor(tidewater);
    expect(await pricesFor(lantern)).toBe(first);
    await tell(tidewater.id);
    expect(await pricesFor(tidewater)).toBe(first);
    await api.db.update(resistorOrderables).set({ priceBreaks: [{ quantity: 1, centsPerThousand: 4000 }] });
    await tell(null);
    for (const team of [tidewater, lantern]) {
      expect((await pricesFor(team)).get(2700)?.[0].lineCents).toBe(1000);
    }
  });
});

describe("what is kept of the catalog", () => {
  it("is of one version for all that one request reads", async () => {
    const context = contextOf(tidewater);
    await usableParts(context);
    await api.addPart({ partNumber: "OWN-2" }, tidewater.id);
    await tell(tidewater.id);
    expect((await usableParts(context)).map(({ partNumber }) => partNumber)).not.toContain("OWN-2");
    expect(await numbersOf(tidewater)).toContain("OWN-2");
  });

  it("does not hold on to a failure", async () => {
    const context = contextOf(tidewater);
    const refused = new Error("refused");
    await expect(readKept(context, "own", "failing", () => Promise.reject(refused))).rejects.toBe(refused);
    expect(await readKept(context, "own", "failing", async () => 42)).toBe(42);
  });

  it("drops what was used least recently once there is too much", async () => {
    const context = contextOf(tidewater);
    let reads = 0;
    const read = (what: string) => readKept(context, "shared", what, async () => ++reads);
    await read("often");
    for (let index = 0; index < 200; index++) {
      await read(`once ${index}`);
      await read("often");
    }
    expect(reads).toBe(201);
    await read("once 0");
    expect(reads).toBe(202);
  });
});
