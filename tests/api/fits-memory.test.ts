import { eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fitsResponseSchema } from "#shared/schemas/fits";
import { parts } from "../../api/db/schema/parts";
import { catalogChanged } from "../../api/features/catalog/service";
import { closePool } from "../../api/ranking/pool";
import { type Agent, BASE, SMALL_BRIEF, startTestApi, type TestApi, type TestTeam } from "../support/api";
import { randomParts } from "../support/build-part";
import { seededRandom } from "../support/random";

let api: TestApi;
let tidewater: TestTeam;
let lantern: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  tidewater = await api.addTeam("tidewater");
  lantern = await api.addTeam("lantern");
  for (const part of randomParts(seededRandom(5), 12)) await api.addPart({ ...part, vdss: 60 });
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

const BRIEF = { ...SMALL_BRIEF, polarity: "either" };

async function rank(agent: Agent, brief: object = BRIEF) {
  const { body } = await agent.post(`${BASE}/fits`).send({ brief }).expect(200);
  return fitsResponseSchema.parse(body);
}

describe("a brief asked for again", () => {
  it("is answered with the very same ranking, time and all", async () => {
    const first = await rank(tidewater.as.designer);
    expect(await rank(tidewater.as.reviewer)).toEqual(first);
    // The same conditions in another order and with the defaults written out are the same brief.
    const reordered = { buildQuantity: 100, ...Object.fromEntries(Object.entries(BRIEF).reverse()) };
    expect((await rank(tidewater.as.designer, reordered)).elapsedMs).toBe(first.elapsedMs);
  });

  it("is ranked anew once the catalog has changed", async () => {
    const before = await rank(tidewater.as.designer);
    const [best] = before.fits;
    await api.db.transaction(async (transaction) => {
      await transaction.update(parts).set({ stock: 4711 }).where(eq(parts.id, best.part.id));
      await catalogChanged(transaction, null);
    });
    const after = await rank(tidewater.as.designer);
    expect(after.fits[0].part.stock).toBe(4711);
  });

  it("keeps each team's own parts to that team", async () => {
    await rank(lantern.as.designer);
    const own = await api.addPart({ ...randomParts(seededRandom(6), 1)[0], vdss: 60, partNumber: "OWN-1" });
    await api.db.transaction(async (transaction) => {
      await transaction.update(parts).set({ teamId: tidewater.id }).where(eq(parts.id, own.id));
      await catalogChanged(transaction, tidewater.id);
    });
    const numbers = async (agent: Agent) => {
      const { fits, passedOver } = await rank(agent);
      return {
        fits: fits.map(({ part }) => part.id),
        parts: fits.length + passedOver.reduce((sum, { parts: n }) => sum + n, 0),
      };
    };
    expect((await numbers(tidewater.as.designer)).parts).toBe(13);
    const others = await numbers(lantern.as.designer);
    expect(others.parts).toBe(12);
    expect(others.fits).not.toContain(own.id);
  });
});
