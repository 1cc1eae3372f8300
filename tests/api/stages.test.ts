import { eq } from "drizzle-orm";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { stageSchema } from "#shared/schemas/stage";
import { parts } from "../../api/db/schema/parts";
import {
  type Agent,
  BASE,
  SMALL_BRIEF,
  SMALL_RESISTORS,
  startTestApi,
  type TestApi,
  type TestTeam,
} from "../support/api";

let api: TestApi;
let team: TestTeam;
let designer: Agent;
let partId: number;

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
  designer = team.as.designer;
});
afterAll(() => api.stop());
let count = 0;
beforeEach(async () => {
  partId = (await api.addPart({ partNumber: `KEEP-${count++}` })).id;
});

const paths = (body: { errors: { path: string }[] }) => body.errors.map(({ path }) => path);

async function keep(overrides: object = {}) {
  const input = { name: "Kept", partId, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF, ...overrides };
  return stageSchema.parse((await designer.post(`${BASE}/stages`).send(input).expect(201)).body);
}

const change = (overrides: object) => ({
  name: "Kept",
  note: "",
  resistors: SMALL_RESISTORS,
  version: 1,
  ...overrides,
});

const read = async (id: number) =>
  stageSchema.parse((await designer.get(`${BASE}/stages/${id}`).expect(200)).body);

describe("a kept stage", () => {
  it("stays as it was when its part leaves the catalog and its brief is changed and deleted", async () => {
    const { body: brief } = await designer
      .post(`${BASE}/briefs`)
      .send({ name: "Origin", brief: SMALL_BRIEF })
      .expect(201);
    const stage = await keep({ brief: brief.brief, briefId: brief.id });
    const next = { name: "Moved on", brief: { ...brief.brief, rail: { volts: 30 } }, version: 1 };
    await designer.put(`${BASE}/briefs/${brief.id}`).send(next).expect(200);
    await designer.delete(`${BASE}/briefs/${brief.id}`).expect(204);
    await api.db.delete(parts).where(eq(parts.id, partId));
    expect(await read(stage.id)).toEqual(stage);
    expect(stage.brief.rail.volts).toBe(12);
  });

  it("takes the part's figures from the catalog, not from the request", async () => {
    const stage = await keep();
    const { body: part } = await designer.get(`${BASE}/parts/${partId}`).expect(200);
    expect(stage.part).toEqual(part);
    expect(stage.createdBy.id).toBe("designer@tidewater.example");
  });

  it("names who changed it last, and when", async () => {
    const stage = await keep();
    api.time.now += 60_000;
    const { body } = await team.as.owner
      .put(`${BASE}/stages/${stage.id}`)
      .send(change({ note: "Seen" }))
      .expect(200);
    expect(body).toMatchObject({ version: 2, note: "Seen", createdAt: stage.createdAt });
    expect(body.createdBy.id).toBe("designer@tidewater.example");
    expect(body.updatedBy.id).toBe("owner@tidewater.example");
    expect(Date.parse(body.updatedAt) - Date.parse(stage.updatedAt)).toBe(60_000);
  });

  it("lets one of two simultaneous edits through", async () => {
    const stage = await keep();
    const edits = ["A", "B", "C"].map((name) =>
      designer.put(`${BASE}/stages/${stage.id}`).send(change({ name })),
    );
    const answers = await Promise.all(edits);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409]);
    expect((await read(stage.id)).name).toBe(answers.find(({ status }) => status === 200)?.body.name);
  });

  it("refuses a version that never was", async () => {
    const stage = await keep();
    const { body } = await designer
      .put(`${BASE}/stages/${stage.id}`)
      .send(change({ version: 9 }))
      .expect(409);
    expect(body.code).toBe("stage.version_conflict");
    expect(await read(stage.id)).toEqual(stage);
  });

  it("trims its name", async () => {
    expect((await keep({ name: "  Line input  " })).name).toBe("Line input");
  });

  it("holds text as it was written", async () => {
    const note = "Ω, 日本語, 😀, \\ % _ ' \" <b>&amp;</b>\n=1+1";
    expect((await read((await keep({ note, name: "Robert'); -- 😀" })).id)).note).toBe(note);
  });
});

describe("the source resistor of a stage", () => {
  const none = { ...SMALL_BRIEF, sourceResistor: "none" };
  const wire = { ...SMALL_RESISTORS, rs: 0 };

  it.each([
    ["a resistor where the brief wants none", none, SMALL_RESISTORS],
    ["none where the brief wants a resistor", SMALL_BRIEF, wire],
    ["none where the brief leaves it unbypassed", { ...SMALL_BRIEF, sourceResistor: "unbypassed" }, wire],
  ])("can't be kept as %s", async (_what, brief, resistors) => {
    const input = { name: "Kept", partId, resistors, brief };
    const { body } = await designer.post(`${BASE}/stages`).send(input).expect(422);
    expect(paths(body)).toEqual(["resistors.rs"]);
  });

  it.each([
    ["a resistor where the brief wants none", none, wire, SMALL_RESISTORS],
    ["none where the brief wants a resistor", SMALL_BRIEF, SMALL_RESISTORS, wire],
  ])("can't be changed to %s, and the stage stays as it was", async (_what, brief, kept, resistors) => {
    const stage = await keep({ brief, resistors: kept });
    const { body } = await designer.put(`${BASE}/stages/${stage.id}`).send(change({ resistors })).expect(422);
    expect(paths(body)).toEqual(["resistors.rs"]);
    expect(await read(stage.id)).toEqual(stage);
  });
});

describe("what a stage is kept from", () => {
  it.each([
    ["part", { partId: 999_999 }],
    ["brief", { briefId: 999_999 }],
  ])("must exist: %s", async (_what, overrides) => {
    const input = { name: "Kept", partId, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF, ...overrides };
    await designer.post(`${BASE}/stages`).send(input).expect(404);
  });

  it("can't be a deleted brief", async () => {
    const { body } = await designer.post(`${BASE}/briefs`).send({ name: "Gone", brief: SMALL_BRIEF });
    await designer.delete(`${BASE}/briefs/${body.id}`).expect(204);
    const input = { name: "Kept", partId, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF, briefId: body.id };
    await designer.post(`${BASE}/stages`).send(input).expect(404);
  });
});
