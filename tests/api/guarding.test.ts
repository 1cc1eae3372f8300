import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import pino from "pino";
import supertest from "supertest";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { problemSchema } from "#shared/schemas/problem";
import { createApp, routes } from "../../api/app";
import { readEnvironment } from "../../api/env";
import { Backoff } from "../../api/http/backoff";
import { createSessions } from "../../api/http/session";
import { BASE, PASSWORD, SMALL_BRIEF, startTestApi, type TestApi, type TestTeam } from "../support/api";

let api: TestApi;
let team: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
});
afterAll(() => api.stop());

/** The same server with other settings, and a log that can be read. */
function withSettings(settings: Record<string, string>, webFolder?: string) {
  const environment = readEnvironment({
    DATABASE_URL: "mysql://x@127.0.0.1/x",
    NODE_ENV: "production",
    ...settings,
  });
  const lines: string[] = [];
  const { db, clock } = api.surroundings;
  const app = createApp(
    {
      ...api.surroundings,
      environment,
      sessions: createSessions(db, environment, clock),
      signInBackoff: new Backoff(),
      log: pino({ level: "trace" }, { write: (line: string) => lines.push(line) }),
    },
    webFolder,
  );
  return { app, lines };
}

const credentials = { email: "designer@tidewater.example", password: PASSWORD };

describe("behind https", () => {
  const settings = { PUBLIC_ORIGIN: "https://evenswing.example" };

  it("the cookie is Secure and bound to its host, and browsers are told to stay on https", async () => {
    const { app } = withSettings(settings);
    const answer = await supertest(app).post(`${BASE}/auth/sign-in`).send(credentials).expect(204);
    const cookie = answer.headers["set-cookie"][0];
    expect(cookie).toMatch(/^__Host-evenswing=/);
    for (const attribute of [/Secure/, /HttpOnly/, /SameSite=Lax/, /Path=\/(;|$)/]) {
      expect(cookie).toMatch(attribute);
    }
    expect(cookie).not.toMatch(/Domain/);
    expect(answer.headers["strict-transport-security"]).toMatch(/max-age=\d{8}/);
    const me = supertest(app).get(`${BASE}/auth/me`);
    await me.set("cookie", cookie.split(";")[0]).expect(200);
  });

  it.each([
    ["https://evenswing.example", 204],
    ["http://evenswing.example", 403],
    ["https://evenswing.example:8443", 403],
    ["https://evenswing.example.elsewhere.example", 403],
    ["null", 403],
  ])("a page at %s gets %i", async (origin, status) => {
    const { app } = withSettings(settings);
    const call = supertest(app).post(`${BASE}/auth/sign-in`).set("origin", origin);
    await call.send(credentials).expect(status);
  });
});

describe("a page of a neighbouring site", () => {
  it.each([
    ["same-site", 403],
    ["cross-site", 403],
    ["same-origin", 201],
    ["none", 201],
  ])("is known by Sec-Fetch-Site: %s gets %i", async (site, status) => {
    const brief = { name: "A brief", brief: SMALL_BRIEF };
    await team.as.designer.post(`${BASE}/briefs`).set("sec-fetch-site", site).send(brief).expect(status);
  });

  it("can't write by a GET: none of them changes anything", async () => {
    const before = (await team.as.owner.get(`${BASE}/briefs`)).body;
    for (const { path } of routes.filter(({ method }) => method === "get")) {
      await team.as.owner.get(BASE + path.replace(":id", "1")).set("origin", "https://elsewhere.example");
    }
    expect((await team.as.owner.get(`${BASE}/briefs`)).body).toEqual(before);
  });
});

describe("every answer", () => {
  const reads = routes.filter(({ method, access }) => method === "get" && access !== "public");

  it.each(reads.map(({ path }) => path))("of %s stays out of caches", async (path) => {
    const answer = await team.as.owner.get(BASE + path.replace(":id", "1"));
    expect(answer.headers["cache-control"]).toBe("no-store");
  });

  it("forbids frames, sniffing, foreign scripts and telling where one came from", async () => {
    const { headers } = await team.as.owner.get(`${BASE}/auth/me`).expect(200);
    expect(headers["content-security-policy"]).toContain("frame-ancestors 'none'");
    expect(headers["content-security-policy"]).not.toContain("unsafe");
    expect(headers["x-content-type-options"]).toBe("nosniff");
    expect(headers["referrer-policy"]).toBe("same-origin");
    expect(headers["x-powered-by"]).toBeUndefined();
    expect(headers["access-control-allow-origin"]).toBeUndefined();
  });
});

describe("the log", () => {
  it("has sign-ins, failed ones and refused access, and never what must stay secret", async () => {
    const { app, lines } = withSettings({});
    const post = (path: string) => supertest(app).post(BASE + path);
    const answer = await post("/auth/sign-in").send({ ...credentials, email: "viewer@tidewater.example" });
    const cookie = answer.headers["set-cookie"][0].split(";")[0];
    await post("/auth/sign-in")
      .send({ ...credentials, password: "guessed-words" })
      .expect(401);
    await post("/briefs").set("cookie", cookie).send({ name: "hushed-name", brief: SMALL_BRIEF }).expect(403);
    await supertest(app).get(`${BASE}/parts?q=hushed-search`).set("cookie", cookie).expect(200);
    const log = lines.join("");
    const messages = lines.map((line) => JSON.parse(line));
    expect(messages).toContainEqual(
      expect.objectContaining({ msg: "signed in", user: "viewer@tidewater.example" }),
    );
    expect(messages).toContainEqual(expect.objectContaining({ msg: "sign-in refused" }));
    expect(messages).toContainEqual(
      expect.objectContaining({ msg: "refused by role", action: "design:write" }),
    );
    for (const secret of [PASSWORD, "guessed-words", cookie.split("=")[1], "hushed", "argon2"]) {
      expect(log).not.toContain(secret);
    }
  });

  it("keeps one line a line, whatever the address holds", async () => {
    const { app, lines } = withSettings({});
    await supertest(app).get(`${BASE}/briefs/%0a%7B"level":60%7D`).expect(401);
    for (const line of lines) expect(line.trim().split("\n")).toHaveLength(1);
    expect(lines.map((line) => JSON.parse(line).level)).not.toContain(60);
  });

  it("tells an unforeseen error with the request id that the caller was given", async () => {
    const lines: string[] = [];
    const failing = () => Promise.reject(new Error("the reading room is on fire"));
    const app = createApp({
      ...api.surroundings,
      sessions: { ...api.surroundings.sessions, identify: failing },
      log: pino({ level: "error" }, { write: (line: string) => lines.push(line) }),
    });
    const { body, text } = await supertest(app).get(`${BASE}/briefs`).expect(500);
    expect(problemSchema.parse(body).code).toBe("unforeseen");
    expect(text).not.toContain("reading room");
    const told = lines.map((line) => JSON.parse(line)).filter(({ err }) => err);
    expect(told.some(({ requestId }) => requestId === body.requestId)).toBe(true);
    expect(lines.join("")).toContain("the reading room is on fire");
  });
});

describe("the built pages", () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), "evenswing-pages-"));
    mkdirSync(join(folder, "assets"));
    writeFileSync(join(folder, "index.html"), "<!doctype html><title>Evenswing</title>");
    writeFileSync(join(folder, "assets", "main-abc.js"), "export {};");
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  it("are fresh each time, their hashed files kept for a year", async () => {
    const { app } = withSettings({}, folder);
    for (const path of ["/", "/briefs/7", "/anything"]) {
      const page = await supertest(app).get(path).expect(200);
      expect(page.text).toContain("<title>Evenswing</title>");
      expect(page.headers["cache-control"]).toBe("no-cache");
    }
    const asset = await supertest(app).get("/assets/main-abc.js").expect(200);
    expect(asset.headers["cache-control"]).toBe("public, max-age=31536000, immutable");
  });

  it("answer 404 for a hashed file of an older build, and log no error", async () => {
    const { app, lines } = withSettings({}, folder);
    await supertest(app).get("/assets/main-old.js").expect(404);
    expect(lines.map((line) => JSON.parse(line).level)).not.toContain(50);
  });

  it.each(["/..%2f..%2fetc%2fpasswd", "/assets/..%2f..%2f..%2fetc%2fpasswd", "/%00", "/assets/%00", "/.env"])(
    "give away nothing beside their folder: %s",
    async (path) => {
      const { app } = withSettings({}, folder);
      const answer = await supertest(app).get(path);
      expect(answer.status).toBeLessThan(500);
      expect(answer.text).not.toMatch(/root:|DATABASE_URL/);
    },
  );

  it("don't take over addresses of the API", async () => {
    const { app } = withSettings({}, folder);
    const answer = await supertest(app).get(`${BASE}/nowhere`).expect(404);
    expect(answer.headers["content-type"]).toMatch(/^application\/problem\+json/);
  });

  it("must be there", () => {
    expect(() => withSettings({}, join(folder, "none"))).toThrow(/Build it first/);
  });
});

describe("demo mode", () => {
  it("tells the accounts and their password; the session's rules stay", async () => {
    const { app } = withSettings({ DEMO_MODE: "1" });
    const { body } = await supertest(app).get(`${BASE}/auth/demo`).expect(200);
    expect(body.accounts).toHaveLength(12);
    expect(body.password).toBe("evenswing-demo");
    await supertest(app).get(`${BASE}/briefs`).expect(401);
  });
});

describe("the health check", () => {
  it("answers without a session", async () => {
    const { body } = await supertest(api.app).get("/healthz").expect(200);
    expect(body).toEqual({ status: "ok" });
  });
});

describe("the environment", () => {
  const right = { DATABASE_URL: "mysql://a:b@127.0.0.1:3306/evenswing" };

  it.each([
    ["DATABASE_URL", ""],
    ["DATABASE_URL", "postgres://a:b@127.0.0.1/x"],
    ["PORT", "70000"],
    ["PORT", "-1"],
    ["PORT", "80.5"],
    ["DEMO_MODE", "yes"],
    ["NODE_ENV", "staging"],
    ["LOG_LEVEL", "loud"],
    ["PUBLIC_ORIGIN", "evenswing.example"],
    ["PUBLIC_ORIGIN", "ftp://evenswing.example"],
    ["SESSION_IDLE_HOURS", "0"],
    ["SESSION_IDLE_HOURS", "never"],
    ["SESSION_ABSOLUTE_HOURS", "-5"],
    ["SESSION_ABSOLUTE_HOURS", "100000"],
  ])("is refused with %s=%s, by name", (name, value) => {
    expect(() => readEnvironment({ ...right, [name]: value })).toThrow(new RegExp(name));
  });

  it("names every wrong variable at once", () => {
    const read = () => readEnvironment({ PORT: "x", DEMO_MODE: "x" });
    for (const name of ["PORT", "DEMO_MODE", "DATABASE_URL"]) expect(read).toThrow(new RegExp(name));
  });

  it("needs no more than the database, and reads hours as such", () => {
    expect(readEnvironment(right)).toMatchObject({ production: false, demo: false, publicOrigin: null });
    const read = readEnvironment({
      ...right,
      SESSION_IDLE_HOURS: "0.5",
      PUBLIC_ORIGIN: "https://a.example/x",
    });
    expect(read).toMatchObject({ sessionIdleMs: 1_800_000, publicOrigin: "https://a.example" });
  });
});
