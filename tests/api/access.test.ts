import supertest from "supertest";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type Action, may, PERMISSIONS, ROLES } from "#shared/permissions";
import { problemSchema } from "#shared/schemas/problem";
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

beforeAll(async () => {
  api = await startTestApi();
  tidewater = await api.addTeam("tidewater");
  lantern = await api.addTeam("lantern");
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

const call = (
  agent: Agent | ReturnType<typeof supertest>,
  method: (typeof routes)[number]["method"],
  path: string,
) => agent[method](BASE + path.replace(":id", "999999"));

describe("every route as every role", () => {
  const guarded = routes.filter(({ access }) => access !== "public");

  it("has a row of the permission table, or is for anyone signed in, or is public on purpose", () => {
    const known = ["signed-in", "public", ...Object.keys(PERMISSIONS)];
    for (const { access, path } of routes) expect(known, path).toContain(access);
    const open = routes.filter(({ access }) => access === "public").map(({ path }) => path);
    expect(open).toEqual(["/auth/sign-in", "/auth/demo"]);
  });

  it.each(guarded.map((route) => ({ ...route, name: `${route.method} ${route.path}` })))(
    "$name is refused to whoever is signed out",
    async ({ method, path }) => {
      const { status, body } = await call(supertest(api.app), method, path).send({});
      expect(status).toBe(401);
      expect(problemSchema.parse(body).code).toBe("signed_out");
    },
  );

  // Signing out and changing team would end the very session that the next case needs.
  const tried = guarded.filter(({ path }) => !["/auth/sign-out", "/auth/team"].includes(path));
  const matrix = tried.flatMap(({ method, path, access }) =>
    ROLES.map((role) => ({
      method,
      path,
      role,
      allowed: access === "signed-in" || may([role], access as Action),
    })),
  );

  it.each(matrix)("$method $path as $role: allowed $allowed", async ({ method, path, role, allowed }) => {
    const { status, body } = await call(tidewater.as[role], method, path).send({});
    if (allowed) expect([200, 204, 404, 422]).toContain(status);
    else {
      expect(status).toBe(403);
      expect(problemSchema.parse(body).code).toBe("role");
    }
  });
});

describe("what belongs to one team", () => {
  /** Each route that names a record, with a record of Tidewater's to name; a new one needs a line here. */
  const owned: Record<string, () => Promise<number>> = {
    "/briefs/:id": async () => (await newBrief()).id,
    "/briefs/:id/restore": async () => deleted("/briefs", (await newBrief()).id),
    "/stages/:id": async () => (await newStage()).id,
    "/stages/:id/restore": async () => deleted("/stages", (await newStage()).id),
    "/stages/:id/yield": async () => (await newStage()).id,
    "/parts/:id": async () => (await api.addPart({ partNumber: `OWN-${Math.random()}` }, tidewater.id)).id,
  };

  async function newBrief(): Promise<{ id: number }> {
    const body = { name: "Theirs alone", brief: SMALL_BRIEF };
    return (await tidewater.as.designer.post(`${BASE}/briefs`).send(body).expect(201)).body;
  }

  async function newStage(): Promise<{ id: number }> {
    const part = await api.addPart({ partNumber: `SHARED-${Math.random()}` });
    const body = { name: "Theirs alone", partId: part.id, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF };
    return (await tidewater.as.designer.post(`${BASE}/stages`).send(body).expect(201)).body;
  }

  async function deleted(path: string, id: number): Promise<number> {
    await tidewater.as.designer.delete(`${BASE}${path}/${id}`).expect(204);
    return id;
  }

  const withId = routes.filter(({ path }) => path.includes(":id"));

  it.each(withId.map(({ method, path }) => ({ method, path })))(
    "is not there for the other team: $method $path",
    async ({ method, path }) => {
      const make = owned[path];
      expect(make, `no record to try ${path} with`).toBeDefined();
      const address = BASE + path.replace(":id", String(await make()));
      const bodies: Record<string, object> = {
        "/briefs/:id": { name: "Taken", brief: SMALL_BRIEF, version: 1 },
        "/stages/:id": { name: "Taken", note: "", resistors: SMALL_RESISTORS, version: 1 },
      };
      const { status, body } = await lantern.as.owner[method](address).send(bodies[path] ?? {});
      expect(status).toBe(404);
      expect(problemSchema.parse(body).code).toBe("not_found");
    },
  );

  it("is in none of the other team's lists, fits or kept stages", async () => {
    await newBrief();
    await newStage();
    const own = await api.addPart({ partNumber: "SECRET-1", kTyp: 0.5 }, tidewater.id);
    for (const path of ["/briefs", "/stages"]) {
      expect((await lantern.as.owner.get(BASE + path).expect(200)).body.items).toEqual([]);
      expect((await tidewater.as.viewer.get(BASE + path).expect(200)).body.items).not.toEqual([]);
    }
    const search = `${BASE}/parts?q=SECRET`;
    expect((await lantern.as.owner.get(search).expect(200)).body.items).toEqual([]);
    expect((await tidewater.as.owner.get(search).expect(200)).body.items).toHaveLength(1);
    const brief = { ...SMALL_BRIEF, parts: { ids: [own.id] } };
    const fits = (agent: Agent) => agent.post(`${BASE}/fits`).send({ brief }).expect(200);
    expect((await fits(lantern.as.designer)).body.fits).toEqual([]);
    expect((await fits(tidewater.as.designer)).body.fits).toHaveLength(1);
    const stolen = { name: "Mine", partId: own.id, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF };
    await lantern.as.designer.post(`${BASE}/stages`).send(stolen).expect(404);
  });

  it("can't be the origin of another team's stage", async () => {
    const brief = await newBrief();
    const part = await api.addPart({ partNumber: "SHARED-ORIGIN" });
    const stage = {
      name: "From elsewhere",
      partId: part.id,
      resistors: SMALL_RESISTORS,
      brief: SMALL_BRIEF,
      briefId: brief.id,
    };
    await lantern.as.designer.post(`${BASE}/stages`).send(stage).expect(404);
    expect((await lantern.as.designer.get(`${BASE}/stages`)).body.items).toEqual([]);
  });
});

describe("a page of another site", () => {
  const unsafe = routes.filter(({ method }) => method !== "get");

  it.each(unsafe.map(({ method, path }) => ({ method, path })))(
    "can't call $method $path",
    async ({ method, path }) => {
      const foreign = await call(tidewater.as.owner, method, path)
        .set("origin", "https://elsewhere.example")
        .send({});
      expect(foreign.status).toBe(403);
      expect(problemSchema.parse(foreign.body).code).toBe("foreign_origin");
      const crossSite = await call(tidewater.as.owner, method, path)
        .set("sec-fetch-site", "cross-site")
        .send({});
      expect(crossSite.status).toBe(403);
    },
  );

  it("is told apart from the product's own page and from a caller that is no browser", async () => {
    const own = await tidewater.as.designer
      .post(`${BASE}/briefs`)
      .set("host", "evenswing.example")
      .set("origin", "http://evenswing.example")
      .set("sec-fetch-site", "same-origin")
      .send({ name: "Ours", brief: SMALL_BRIEF });
    expect(own.status).toBe(201);
    await tidewater.as.designer.post(`${BASE}/briefs`).send({ name: "Ours", brief: SMALL_BRIEF }).expect(201);
  });
});
