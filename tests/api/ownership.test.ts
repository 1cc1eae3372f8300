import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fitsResponseSchema } from "#shared/schemas/fits";
import { routes } from "../../api/app";
import { closePool } from "../../api/ranking/pool";
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
let tidewater: TestTeam;
let lantern: TestTeam;
let shared: number;
let own: number;

beforeAll(async () => {
  api = await startTestApi();
  tidewater = await api.addTeam("tidewater");
  lantern = await api.addTeam("lantern");
  shared = (await api.addPart({ partNumber: "SHARED-1" })).id;
  own = (await api.addPart({ partNumber: "OWN-1" }, tidewater.id)).id;
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

const newBrief = async (agent: Agent) =>
  (await agent.post(`${BASE}/briefs`).send({ name: "A brief", brief: SMALL_BRIEF }).expect(201)).body;

const newStage = async (agent: Agent) => {
  const stage = { name: "A stage", partId: shared, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF };
  return (await agent.post(`${BASE}/stages`).send(stage).expect(201)).body;
};

describe("a list", () => {
  /** Each list of the API, with a record that is Tidewater's alone; a new list needs a line here. */
  const lists: Record<string, () => Promise<number>> = {
    "/briefs": async () => (await newBrief(tidewater.as.designer)).id,
    "/stages": async () => (await newStage(tidewater.as.designer)).id,
    "/parts": async () => own,
  };
  const notLists = ["/auth/me", "/auth/demo"];
  const paths = routes
    .filter(({ method, path }) => method === "get" && !path.includes(":") && !notLists.includes(path))
    .map(({ path }) => path);

  it.each(paths)(
    "%s shows a team's record to the team alone, whatever the query or headers say",
    async (path) => {
      const make = lists[path];
      expect(make, `no record to look for in ${path}`).toBeDefined();
      const id = await make();
      const ids = async (agent: Agent) =>
        (
          await agent
            .get(BASE + path)
            .set("x-team-id", String(tidewater.id))
            .expect(200)
        ).body.items.map((item: { id: number }) => item.id);
      expect(await ids(tidewater.as.viewer)).toContain(id);
      expect(await ids(lantern.as.owner)).not.toContain(id);
      const query = await lantern.as.owner.get(BASE + path).query({ teamId: tidewater.id });
      expect(JSON.stringify(query.body.items ?? [])).not.toContain(`"id":${id},`);
    },
  );

  it("follows the session's team for somebody in both", async () => {
    const theirs = await newBrief(tidewater.as.designer);
    await api.addMember(tidewater.id, "both@x.example", ["viewer"]);
    await api.addMember(lantern.id, "both@x.example", ["designer"]);
    const agent = await api.signIn("both@x.example");
    await agent.get(`${BASE}/briefs/${theirs.id}`).expect(200);
    // A designer elsewhere is still only a viewer here.
    await agent.delete(`${BASE}/briefs/${theirs.id}`).expect(403);
    await agent.post(`${BASE}/auth/team`).send({ teamId: lantern.id }).expect(204);
    await agent.get(`${BASE}/briefs/${theirs.id}`).expect(404);
    await agent.delete(`${BASE}/briefs/${theirs.id}`).expect(404);
  });
});

describe("what another team tries on a record", () => {
  it.each([
    ["/briefs", newBrief, { name: "Taken", brief: SMALL_BRIEF, version: 1 }],
    ["/stages", newStage, { name: "Taken", note: "", resistors: SMALL_RESISTORS, version: 1 }],
  ])("%s/:id leaves it as it was", async (path, make, change) => {
    const record = await make(tidewater.as.designer);
    const address = `${BASE}${path}/${record.id}`;
    await lantern.as.owner.put(address).send(change).expect(404);
    await lantern.as.owner.delete(address).expect(404);
    expect((await tidewater.as.designer.get(address).expect(200)).body).toEqual(record);
    await tidewater.as.designer.delete(address).expect(204);
    await lantern.as.owner.post(`${address}/restore`).expect(404);
    await tidewater.as.designer.get(address).expect(404);
  });

  it("reads the same as a number that nobody has", async () => {
    const { id } = await newBrief(tidewater.as.designer);
    const told = async (number: number) => {
      const { body } = await lantern.as.owner.get(`${BASE}/briefs/${number}`).expect(404);
      return { ...body, requestId: "" };
    };
    expect(await told(id)).toEqual(await told(999_999_999));
  });
});

describe("a ranking", () => {
  const rank = async (agent: Agent, brief: object) => {
    const { body } = await agent.post(`${BASE}/fits`).send({ brief }).expect(200);
    const answer = fitsResponseSchema.parse(body);
    const passedOver = answer.passedOver.reduce((sum, { parts }) => sum + parts, 0);
    return { answer, parts: passedOver + answer.partsThatFit };
  };

  it("speaks only for the parts that the team may see", async () => {
    const theirs = await rank(tidewater.as.designer, SMALL_BRIEF);
    const others = await rank(lantern.as.designer, SMALL_BRIEF);
    expect(theirs.parts).toBe(2);
    expect(others.parts).toBe(1);
    expect(others.answer.fits.map(({ part }) => part.id)).toEqual([shared]);
    expect(theirs.answer.considered).toBe(2 * others.answer.considered);
  });

  it("doesn't advise to allow a part that is another team's", async () => {
    const { answer } = await rank(lantern.as.designer, { ...SMALL_BRIEF, parts: { ids: [own] } });
    expect(answer.fits).toEqual([]);
    expect(answer.relax).toMatchObject({ condition: "part-filter", parts: 1 });
    expect(JSON.stringify(answer)).not.toContain("OWN-1");
  });
});

describe("who may change what a team designs", () => {
  // Written out from the product's description of the roles, apart from the table that the server reads.
  it.each([
    ["owner", 201],
    ["designer", 201],
    ["reviewer", 403],
    ["librarian", 403],
    ["buyer", 403],
    ["viewer", 403],
  ] as const)("%s gets %i for a new brief, and can read", async (role, status) => {
    const brief = { name: "A brief", brief: SMALL_BRIEF };
    await tidewater.as[role].post(`${BASE}/briefs`).send(brief).expect(status);
    await tidewater.as[role].get(`${BASE}/briefs`).expect(200);
    await tidewater.as[role].get(`${BASE}/parts`).expect(200);
    await tidewater.as[role].post(`${BASE}/fits`).send({ brief: SMALL_BRIEF }).expect(200);
  });
});
