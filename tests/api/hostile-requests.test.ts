import { gzipSync } from "node:zlib";
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { problemSchema } from "#shared/schemas/problem";
import { routes } from "../../api/app";
import { closePool } from "../../api/ranking/pool";
import { type Agent, BASE, SMALL_BRIEF, SMALL_RESISTORS, startTestApi, type TestApi } from "../support/api";

let api: TestApi;
let designer: Agent;
let partId: number;

beforeAll(async () => {
  api = await startTestApi();
  designer = (await api.addTeam("tidewater")).as.designer;
  partId = (await api.addPart()).id;
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

const JSON_TYPE = "application/json";
const goodBrief = { name: "A brief", brief: SMALL_BRIEF };
const postBrief = () => designer.post(`${BASE}/briefs`);
const briefCount = async () => (await designer.get(`${BASE}/briefs`).expect(200)).body.items.length;
const sentRaw = (headers: Record<string, string>, body: string | Buffer) =>
  postBrief()
    .set(headers)
    .serialize((sent) => sent as unknown as string)
    .send(body as string);

describe("a body that isn't what it should be", () => {
  it.each([
    ["cut off", { "content-type": JSON_TYPE }, '{"name":', 400, "bad_json"],
    ["a bare word", { "content-type": JSON_TYPE }, '"name"', 400, "bad_json"],
    ["in an unknown character set", { "content-type": `${JSON_TYPE}; charset=morse` }, "{}", 415, "not_json"],
    [
      "packed in an unknown way",
      { "content-type": JSON_TYPE, "content-encoding": "zoo" },
      "{}",
      415,
      "not_json",
    ],
    [
      "packed badly",
      { "content-type": JSON_TYPE, "content-encoding": "gzip" },
      "not packed",
      400,
      "bad_request",
    ],
    ["form fields", { "content-type": "application/x-www-form-urlencoded" }, "name=A", 422, "invalid"],
    ["plain text", { "content-type": "text/plain" }, JSON.stringify(goodBrief), 422, "invalid"],
    ["empty", { "content-type": JSON_TYPE }, "", 422, "invalid"],
    ["a list", { "content-type": JSON_TYPE }, "[]", 422, "invalid"],
  ])(
    "(%s) is refused in the one shape, and nothing is written",
    async (_what, headers, body, status, code) => {
      const before = await briefCount();
      const answer = await sentRaw(headers as unknown as Record<string, string>, body);
      expect([answer.status, problemSchema.parse(answer.body).code]).toEqual([status, code]);
      expect(answer.headers["content-type"]).toMatch(/^application\/problem\+json/);
      expect(await briefCount()).toBe(before);
    },
  );

  it("(small on the way, huge unpacked) is too large", async () => {
    const bomb = gzipSync(JSON.stringify({ ...goodBrief, name: "x".repeat(5_000_000) }));
    const headers = { "content-type": JSON_TYPE, "content-encoding": "gzip" };
    const { status, body } = await sentRaw(headers, bomb);
    expect([status, body.code]).toEqual([413, "too_large"]);
  });
});

describe("a key that nobody declared", () => {
  it.each([
    ["__proto__", '{"name":"A","brief":{"rail":{"volts":12}},"__proto__":{"polluted":true}}'],
    ["brief.__proto__", '{"name":"A","brief":{"rail":{"volts":12},"__proto__":{"polluted":true}}}'],
    ["brief.rail.__proto__", '{"name":"A","brief":{"rail":{"volts":12,"__proto__":{"polluted":true}}}}'],
    [
      "constructor",
      '{"name":"A","brief":{"rail":{"volts":12}},"constructor":{"prototype":{"polluted":true}}}',
    ],
  ])("%s changes no prototype and is never stored", async (_path, text) => {
    const answer = await postBrief().set("content-type", JSON_TYPE).send(text);
    expect([201, 422]).toContain(answer.status);
    expect(JSON.stringify(answer.body)).not.toContain("polluted");
    expect(({} as { polluted?: boolean }).polluted).toBeUndefined();
    expect((await designer.get(`${BASE}/briefs`)).text).not.toContain("polluted");
  });

  const stage = { name: "Kept", resistors: SMALL_RESISTORS, brief: SMALL_BRIEF };
  it.each([
    ["/briefs", { ...goodBrief, version: 7 }, "version"],
    ["/briefs", { ...goodBrief, id: 1 }, "id"],
    ["/briefs", { ...goodBrief, deletedAt: null }, "deletedAt"],
    [
      "/briefs",
      { ...goodBrief, brief: { ...SMALL_BRIEF, rail: { volts: 9, teamId: 1 } } },
      "brief.rail.teamId",
    ],
    ["/stages", { ...stage, teamId: 2 }, "teamId"],
    ["/stages", { ...stage, createdBy: "owner@tidewater.example" }, "createdBy"],
    ["/stages", { ...stage, part: { id: 1 } }, "part"],
    ["/stages", { ...stage, resistors: { ...SMALL_RESISTORS, rl: 1 } }, "resistors.rl"],
    ["/stages", { ...stage, name: " " }, "name"],
    ["/stages", { ...stage, name: "x".repeat(121) }, "name"],
    ["/stages", { ...stage, note: "x".repeat(5001) }, "note"],
    ["/stages", { ...stage, resistors: { ...SMALL_RESISTORS, r1: 2e8 } }, "resistors.r1"],
    ["/fits", { brief: SMALL_BRIEF, teamId: 2 }, "teamId"],
    ["/auth/team", { teamId: 1, role: "owner" }, "role"],
    ["/auth/sign-in", { email: "a@b.example", password: "x", remember: true }, "remember"],
  ])("or a value out of bounds in %s is refused at the field (%#)", async (path, body, field) => {
    const sent = path === "/stages" ? { partId, ...body } : body;
    const answer = await designer
      .post(BASE + path)
      .send(sent)
      .expect(422);
    expect(answer.body.errors.map((error: { path: string }) => error.path)).toEqual([field]);
  });
});

describe("an address that isn't what it should be", () => {
  it.each([
    ["/briefs/%E0%A4%A", 400, "bad_path"],
    ["/briefs/0", 422, "invalid"],
    ["/briefs/-1", 422, "invalid"],
    ["/briefs/1.5", 422, "invalid"],
    ["/briefs/4294967296", 422, "invalid"],
    ["/briefs/1;DROP TABLE briefs", 422, "invalid"],
    ["/parts?q=a&q=b", 422, "invalid"],
    ["/parts?limit=5&limit=500", 422, "invalid"],
    ["/parts?q[x]=1", 422, "invalid"],
    [`/parts?q=${"x".repeat(101)}`, 422, "invalid"],
    ["/parts?__proto__=1", 422, "invalid"],
  ])("%s is refused, not tried", async (path, status, code) => {
    const answer = await designer.get(BASE + path);
    expect([answer.status, problemSchema.parse(answer.body).code]).toEqual([status, code]);
  });

  it.each(["patch", "put", "delete"] as const)("has no %s where none is declared", async (method) => {
    const { body } = await designer[method](`${BASE}/briefs`).send({}).expect(404);
    expect(problemSchema.parse(body).code).toBe("not_found");
  });
});

describe("whatever is sent", () => {
  /** A valid body with one value, anywhere in it, replaced. */
  const spoilt = (valid: object) =>
    fc.tuple(fc.nat(), fc.anything({ maxDepth: 1 })).map(([pick, value]) => {
      const copy = structuredClone(valid) as Record<string, unknown>;
      const places: [Record<string, unknown>, string][] = [];
      const visit = (node: Record<string, unknown>) => {
        for (const [key, inner] of Object.entries(node)) {
          places.push([node, key]);
          if (typeof inner === "object" && inner !== null) visit(inner as Record<string, unknown>);
        }
      };
      visit(copy);
      const [node, key] = places[pick % places.length];
      node[key] = value;
      return copy;
    });
  const sendable = (body: unknown) => {
    try {
      return JSON.stringify(body, (_key, value) => (typeof value === "bigint" ? Number(value) : value));
    } catch {
      return undefined;
    }
  };

  const device = { polarity: "n", vt: 1, k: 0.01, lambda: 0.01 };
  const values = { vdd: 12, r1: 1e5, r2: 1e5, rd: 1e3, rs: 100, rl: 1e4, sourceBypassed: true };
  it.each([
    ["/bias/solve", { device, stage: values, inputPeak: 0.1 }],
    ["/briefs", goodBrief],
    ["/stages", { name: "Kept", note: "", partId: 1, resistors: SMALL_RESISTORS, brief: SMALL_BRIEF }],
    ["/auth/team", { teamId: 1 }],
  ])("to %s, the answer is one that the route declares", async (path, valid) => {
    await fc.assert(
      fc.asyncProperty(spoilt(valid), async (body) => {
        const text = sendable(body);
        if (text === undefined) return;
        const answer = await designer
          .post(BASE + path)
          .set("content-type", JSON_TYPE)
          .send(text);
        expect(answer.status, answer.text).toBeLessThan(500);
        const route = routes.find((one) => one.method === "post" && one.path === path);
        if (answer.status >= 400) problemSchema.parse(answer.body);
        else route?.response?.parse(answer.body);
      }),
      { numRuns: 60, seed: 20 },
    );
  });

  it("as a search, it is looked up as text", async () => {
    await fc.assert(
      fc.asyncProperty(fc.string({ unit: "binary", maxLength: 40 }), async (q) => {
        await designer.get(`${BASE}/parts`).query({ q }).expect(200);
      }),
      { numRuns: 60, seed: 21 },
    );
  });
});
