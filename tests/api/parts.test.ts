import { eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type Part, partPageSchema, partSchema } from "#shared/schemas/part";
import { parts } from "../../api/db/schema/parts";
import { type Agent, BASE, startTestApi, type TestApi, type TestTeam } from "../support/api";

let api: TestApi;
let team: TestTeam;
let agent: Agent;
const catalog: Part[] = [];

// Numbers that two makers share, that differ in case, and that hold what a pattern would read otherwise.
const ROWS: Partial<Part>[] = [
  { partNumber: "AA-1", maker: "Alder" },
  { partNumber: "AA-1", maker: "Birch" },
  { partNumber: "AA-1", maker: "Cedar", polarity: "p" },
  { partNumber: "ab-2", maker: "Alder", package: "TO-92", mounting: "through-hole" },
  { partNumber: "AC-3", maker: "Alder", package: "TO-92", mounting: "through-hole", polarity: "p" },
  { partNumber: "B%4", maker: "Birch" },
  { partNumber: "B_5", maker: "Birch" },
  { partNumber: "B\\6", maker: "Birch" },
  { partNumber: "B'7", maker: "Birch" },
  { partNumber: "BX8", maker: "100% Oak" },
];

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
  agent = team.as.viewer;
  for (const row of ROWS) catalog.push(await api.addPart(row));
  catalog.push(await api.addPart({ partNumber: "AA-1", maker: "Alder" }, team.id));
});
afterAll(() => api.stop());

const page = async (query: object) =>
  partPageSchema.parse((await agent.get(`${BASE}/parts`).query(query).expect(200)).body);
const numbers = async (query: object) => (await page(query)).items.map(({ partNumber }) => partNumber);

async function walk(query: object): Promise<Part[][]> {
  const pages: Part[][] = [];
  let cursor: string | null = null;
  do {
    const { items, nextCursor }: { items: Part[]; nextCursor: string | null } = await page(
      cursor === null ? query : { ...query, cursor },
    );
    pages.push(items);
    cursor = nextCursor;
  } while (cursor !== null && pages.length < 50);
  return pages;
}

describe("walking the catalog", () => {
  it.each([1, 2, 3, 4, 5, 11, 12, 200])(
    "%i at a time meets each part once, in one order, shared numbers included",
    async (limit) => {
      const pages = await walk({ limit });
      const whole = (await page({ limit: 200 })).items;
      expect(pages.flat()).toEqual(whole);
      expect(whole.map(({ id }) => id).sort((a, b) => a - b)).toEqual(catalog.map(({ id }) => id));
      expect(pages).toHaveLength(Math.ceil(catalog.length / limit));
    },
  );

  it("keeps its filters from page to page", async () => {
    const pages = await walk({ limit: 1, q: "AA", polarity: "n" });
    expect(pages.flat().map(({ maker }) => maker)).toEqual(["Alder", "Birch", "Alder"]);
  });

  it("goes on after the last part seen, even if that one has left the catalog", async () => {
    const leaving = await api.addPart({ partNumber: "AA-2" });
    const { items, nextCursor } = await page({ limit: 5 });
    expect(items[4]).toEqual(leaving);
    await api.db.delete(parts).where(eq(parts.id, leaving.id));
    expect(await numbers({ limit: 2, cursor: nextCursor })).toEqual(["ab-2", "AC-3"]);
  });

  it("reads a part as the list has it", async () => {
    const [part] = (await page({ limit: 1 })).items;
    const { body } = await agent.get(`${BASE}/parts/${part.id}`).expect(200);
    expect(partSchema.parse(body)).toEqual(part);
  });

  it.each([
    ["no base64", "%%%"],
    ["no JSON", Buffer.from("part").toString("base64url")],
    ["null", Buffer.from("null").toString("base64url")],
    ["an object", Buffer.from("{}").toString("base64url")],
    ["a number for a number", Buffer.from("[1,1]").toString("base64url")],
    ["a fraction for an id", Buffer.from('["A",1.5]').toString("base64url")],
    ["too long", "A".repeat(201)],
  ])("refuses a cursor that is %s", async (_what, cursor) => {
    const { body } = await agent.get(`${BASE}/parts`).query({ cursor }).expect(422);
    expect(body.errors.map(({ path }: { path: string }) => path)).toEqual(["cursor"]);
  });

  it.each([
    [{ limit: 0 }, "limit"],
    [{ limit: 201 }, "limit"],
    [{ limit: "" }, "limit"],
    [{ limit: "ten" }, "limit"],
    [{ polarity: "x" }, "polarity"],
    [{ teamId: 1 }, "teamId"],
  ])("refuses %j at the field", async (query, path) => {
    const { body } = await agent.get(`${BASE}/parts`).query(query).expect(422);
    expect(body.errors.map((error: { path: string }) => error.path)).toEqual([path]);
  });
});

describe("looking for a part", () => {
  it.each([
    ["%", ["B%4", "BX8"]],
    ["_", ["B_5"]],
    ["\\", ["B\\6"]],
    ["'", ["B'7"]],
    ["B%", ["B%4"]],
    ["bx", ["BX8"]],
    ["oak", ["BX8"]],
    ["AB-2", ["ab-2"]],
    ["no such thing", []],
  ])("by %s finds what holds just that, in number or maker, in any case", async (q, expected) => {
    expect(await numbers({ q })).toEqual(expected);
  });

  it.each([
    [{ polarity: "p" }, ["AA-1", "AC-3"]],
    [{ package: "TO-92" }, ["ab-2", "AC-3"]],
    [{ package: "TO-92", polarity: "n" }, ["ab-2"]],
    [{ package: "TO-92", q: "birch" }, []],
  ])("with %j finds what meets all of it", async (query, expected) => {
    expect(await numbers(query)).toEqual(expected);
  });
});
