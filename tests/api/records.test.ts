import { eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { savedBriefSchema } from "#shared/schemas/brief";
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

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
  designer = team.as.designer;
});
afterAll(() => api.stop());

const paths = (body: { errors: { path: string }[] }) => body.errors.map(({ path }) => path);

async function createBrief(name = "First stage") {
  const { body } = await designer.post(`${BASE}/briefs`).send({ name, brief: SMALL_BRIEF }).expect(201);
  return savedBriefSchema.parse(body);
}

describe("a brief", () => {
  it("is saved with its defaults filled in, and read back the same", async () => {
    const saved = await createBrief();
    expect(saved).toMatchObject({
      version: 1,
      brief: { derating: { vds: 0.8 }, sourceResistor: "bypassed" },
    });
    const { body } = await team.as.viewer.get(`${BASE}/briefs/${saved.id}`).expect(200);
    expect(body).toEqual(saved);
  });

  it("gets a new version with each change", async () => {
    const saved = await createBrief();
    const change = { name: "Renamed", brief: { ...saved.brief, swing: { peak: 2 } }, version: 1 };
    const { body } = await designer.put(`${BASE}/briefs/${saved.id}`).send(change).expect(200);
    expect(body).toMatchObject({ name: "Renamed", version: 2, brief: { swing: { peak: 2 } } });
  });

  it("refuses a stale edit, says what changed, and writes nothing", async () => {
    const saved = await createBrief();
    const theirs = { name: "Theirs", brief: { ...saved.brief, swing: { peak: 3 } }, version: 1 };
    await team.as.owner.put(`${BASE}/briefs/${saved.id}`).send(theirs).expect(200);
    const mine = { name: "Mine", brief: saved.brief, version: 1 };
    const { body } = await designer.put(`${BASE}/briefs/${saved.id}`).send(mine).expect(409);
    expect(body.code).toBe("brief.version_conflict");
    expect(paths(body)).toEqual(["name", "brief.swing.peak"]);
    expect(body.current).toMatchObject({ name: "Theirs", version: 2 });
    const now = await designer.get(`${BASE}/briefs/${saved.id}`);
    expect(now.body).toMatchObject({ name: "Theirs", version: 2 });
  });

  it("lets one of two simultaneous edits through", async () => {
    const saved = await createBrief();
    const edit = (name: string) =>
      designer.put(`${BASE}/briefs/${saved.id}`).send({ name, brief: saved.brief, version: 1 });
    const answers = await Promise.all(["A", "B", "C", "D"].map(edit));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409]);
  });

  it("is gone once deleted, and back once restored", async () => {
    const saved = await createBrief("To be deleted");
    await designer.delete(`${BASE}/briefs/${saved.id}`).expect(204);
    await designer.get(`${BASE}/briefs/${saved.id}`).expect(404);
    await designer.delete(`${BASE}/briefs/${saved.id}`).expect(404);
    const stale = { name: "No", brief: saved.brief, version: 1 };
    await designer.put(`${BASE}/briefs/${saved.id}`).send(stale).expect(404);
    const { body } = await designer.post(`${BASE}/briefs/${saved.id}/restore`).expect(200);
    expect(body).toEqual(saved);
    await designer.post(`${BASE}/briefs/${saved.id}/restore`).expect(404);
  });

  it.each([
    { what: "no name", change: { name: "  " }, path: "name" },
    { what: "a long name", change: { name: "x".repeat(121) }, path: "name" },
    { what: "a field of nobody's", change: { teamId: 2 }, path: "teamId" },
    { what: "another's authorship", change: { createdBy: "owner" }, path: "createdBy" },
    { what: "a rail too low", change: { brief: { rail: { volts: 0.4 } } }, path: "brief.rail.volts" },
    { what: "a rail too high", change: { brief: { rail: { volts: 451 } } }, path: "brief.rail.volts" },
    { what: "no rail", change: { brief: {} }, path: "brief.rail" },
    {
      what: "a resistor too small",
      change: { brief: { ...SMALL_BRIEF, resistors: { drain: { min: 0.05 } } } },
      path: "brief.resistors.drain.min",
    },
    {
      what: "a smallest above a largest",
      change: { brief: { ...SMALL_BRIEF, resistors: { drain: { min: 5000, max: 100 } } } },
      path: "brief.resistors.drain.min",
    },
    {
      what: "a least gain above the greatest",
      change: { brief: { ...SMALL_BRIEF, gain: { min: 9, max: 3 } } },
      path: "brief.gain.min",
    },
    {
      what: "an unknown condition",
      change: { brief: { ...SMALL_BRIEF, noise: { max: 1 } } },
      path: "brief.noise",
    },
  ])("with $what is refused at the field", async ({ change, path }) => {
    const before = (await designer.get(`${BASE}/briefs`)).body.items.length;
    const { body } = await designer
      .post(`${BASE}/briefs`)
      .send({ name: "A brief", brief: SMALL_BRIEF, ...change })
      .expect(422);
    expect(paths(body)).toEqual([path]);
    expect((await designer.get(`${BASE}/briefs`)).body.items).toHaveLength(before);
  });

  it("can't be made to pollute prototypes", async () => {
    const text = `{"name":"A brief","brief":{"rail":{"volts":12},"__proto__":{"polluted":true}}}`;
    await designer.post(`${BASE}/briefs`).set("content-type", "application/json").send(text);
    expect(({} as { polluted?: boolean }).polluted).toBeUndefined();
  });
});

describe("a stage", () => {
  async function keep(overrides: object = {}) {
    const part = await api.addPart({ partNumber: `KEEP-${Math.random()}` });
    const input = {
      name: "Kept",
      partId: part.id,
      resistors: SMALL_RESISTORS,
      brief: SMALL_BRIEF,
      ...overrides,
    };
    const { body } = await designer.post(`${BASE}/stages`).send(input).expect(201);
    return stageSchema.parse(body);
  }

  it("freezes the part's figures, whatever becomes of the catalog", async () => {
    const stage = await keep();
    await api.db.update(parts).set({ vtTyp: 9, stock: 0 }).where(eq(parts.id, stage.part.id));
    const { body } = await team.as.viewer.get(`${BASE}/stages/${stage.id}`).expect(200);
    expect(body.part).toEqual(stage.part);
    expect(body.part.vtTyp).toBe(1.2);
  });

  it("remembers the brief and version it came from", async () => {
    const brief = await createBrief("Origin");
    const stage = await keep({ briefId: brief.id });
    expect(stage.origin).toEqual({ briefId: brief.id, briefName: "Origin", briefVersion: 1 });
    const change = { name: "Origin, renamed", brief: brief.brief, version: 1 };
    await designer.put(`${BASE}/briefs/${brief.id}`).send(change).expect(200);
    const { body } = await designer.get(`${BASE}/stages/${stage.id}`);
    expect(body.origin).toEqual(stage.origin);
  });

  it("refuses a stale edit, says what differs, and keeps what was there", async () => {
    const stage = await keep();
    const edit = { name: "Kept", note: "", resistors: { ...SMALL_RESISTORS, r2: 200_000 }, version: 1 };
    await team.as.owner.put(`${BASE}/stages/${stage.id}`).send(edit).expect(200);
    const mine = { name: "Kept", note: "My note", resistors: SMALL_RESISTORS, version: 1 };
    const { body } = await designer.put(`${BASE}/stages/${stage.id}`).send(mine).expect(409);
    expect(body.code).toBe("stage.version_conflict");
    expect(paths(body).sort()).toEqual(["note", "resistors.r2"]);
    expect(body.current.resistors.r2).toBe(200_000);
  });

  it("has a source resistor exactly where its brief asks for one", async () => {
    const part = await api.addPart({ partNumber: "NO-RS" });
    const none = { ...SMALL_BRIEF, sourceResistor: "none" };
    const input = { name: "Kept", partId: part.id, resistors: SMALL_RESISTORS, brief: none };
    const { body } = await designer.post(`${BASE}/stages`).send(input).expect(422);
    expect(paths(body)).toEqual(["resistors.rs"]);
    const wire = { ...input, resistors: { ...SMALL_RESISTORS, rs: 0 } };
    await designer.post(`${BASE}/stages`).send(wire).expect(201);
  });

  it("is gone once deleted, and back once restored", async () => {
    const stage = await keep();
    await designer.delete(`${BASE}/stages/${stage.id}`).expect(204);
    await designer.get(`${BASE}/stages/${stage.id}`).expect(404);
    const { body } = await designer.post(`${BASE}/stages/${stage.id}/restore`).expect(200);
    expect(body).toEqual(stage);
  });
});
