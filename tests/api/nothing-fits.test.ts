import { createServer, request as httpRequest } from "node:http";
import type { AddressInfo } from "node:net";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fitsResponseSchema } from "#shared/schemas/fits";
import { problemSchema } from "#shared/schemas/problem";
import { closePool } from "../../api/ranking/pool";
import { type Agent, BASE, SMALL_BRIEF, startTestApi, type TestApi } from "../support/api";
import { randomParts } from "../support/build-part";
import { type Random, seededRandom } from "../support/random";

const PARTS = 12;
let api: TestApi;
let designer: Agent;
const ids: number[] = [];

beforeAll(async () => {
  api = await startTestApi();
  designer = (await api.addTeam("tidewater")).as.designer;
  for (const part of randomParts(seededRandom(5), PARTS))
    ids.push((await api.addPart({ ...part, vdss: 60, stock: 0 })).id);
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

const base = { ...SMALL_BRIEF, polarity: "either" };
const fits = async (brief: object, more: object = {}) =>
  fitsResponseSchema.parse(
    (
      await designer
        .post(`${BASE}/fits`)
        .send({ brief, ...more })
        .expect(200)
    ).body,
  );
type Answer = Awaited<ReturnType<typeof fits>>;
const spokenFor = ({ passedOver, partsThatFit }: Answer) =>
  passedOver.reduce((sum, { parts }) => sum + parts, partsThatFit);

/** The brief with one field, named by a dotted path, at another value. */
function withField(brief: object, path: string, value: number | null): object {
  const [head, ...rest] = path.split(".");
  const fields = brief as Record<string, object>;
  return {
    ...fields,
    [head]: rest.length > 0 ? withField(fields[head] ?? {}, rest.join("."), value) : value,
  };
}

describe("a limit that nothing meets", () => {
  const limits: [string, (random: Random) => number][] = [
    ["swing.peak", (random) => random.between(7, 12)],
    ["gain.min", (random) => random.logBetween(500, 5000)],
    ["gain.max", (random) => random.logBetween(1e-3, 0.05)],
    ["inputResistance.min", (random) => random.logBetween(6e5, 1e7)],
    ["supplyCurrent.max", (random) => random.logBetween(1e-8, 1e-6)],
    ["sourceDrop.min", (random) => random.between(9, 12)],
    ["highCorner.min", (random) => random.logBetween(1e10, 1e13)],
    ["distortion.max", (random) => random.logBetween(1e-9, 1e-7)],
    ["derating.vds", (random) => random.between(0.01, 0.19)],
    ["derating.power", (random) => random.logBetween(1e-7, 1e-6)],
    ["derating.resistorPower", (random) => random.logBetween(1e-8, 1e-7)],
  ];

  it.each(limits)(
    "(%s) is named, and relaxed as said gives a fit; a hair tighter gives none",
    async (path, draw) => {
      const source = path === "highCorner.min" ? { source: { ohms: 1e4 } } : {};
      const brief = withField({ ...base, ...source }, path, draw(seededRandom(path.length)));
      const answer = await fits(brief);
      expect(answer.fits).toEqual([]);
      expect(spokenFor(answer)).toBe(PARTS);
      const needed = answer.relax?.needed ?? Number.NaN;
      expect(answer.relax?.path).toBe(path);
      const relaxed = await fits(withField(brief, path, needed));
      expect(relaxed.fits.length).toBeGreaterThan(0);
      // Told to three digits: a twentieth of the way back to what was stated, it no longer fits.
      const stated = answer.relax?.stated ?? Number.NaN;
      const tighter = needed * (stated / needed) ** 0.05;
      expect((await fits(withField(brief, path, tighter))).fits).toEqual([]);
    },
  );

  it("that is a filter is named by its field", async () => {
    const answer = await fits({ ...base, parts: { stockedOnly: true } });
    expect(answer.relax).toMatchObject({ condition: "stock", path: "parts.stockedOnly", needed: null });
    expect(answer.relax?.parts).toBe((await fits(base)).partsThatFit);
    expect(answer.passedOver).toMatchObject([{ reason: "stock", parts: PARTS }]);
  });

  it("and that no single change helps is not blamed on one", async () => {
    const answer = await fits({ ...base, gain: { min: 5000 }, inputResistance: { min: 1e8 } });
    expect(answer.fits).toEqual([]);
    expect(answer.relax).toBeNull();
  });
});

describe("an answer", () => {
  it("speaks for every part once, whatever the brief asks", async () => {
    const random = seededRandom(31);
    for (let trial = 0; trial < 12; trial++) {
      const answer = await fits({
        ...base,
        polarity: random.pick(["n", "p", "either"]),
        swing: { peak: random.between(0.5, 4) },
        gain: random.chance(0.5) ? { min: random.logBetween(1, 60) } : {},
        supplyCurrent: random.chance(0.5) ? { max: random.logBetween(1e-4, 1e-2) } : {},
        inputResistance: random.chance(0.5) ? { min: random.logBetween(1e5, 4e5) } : {},
        parts: random.chance(0.5) ? { ids: ids.slice(0, 7) } : {},
      });
      expect(spokenFor(answer)).toBe(PARTS);
      if (answer.fits.length > 0) expect(answer.relax).toBeNull();
      expect(answer.fits).toHaveLength(answer.partsThatFit);
    }
  });

  it("is cut to the limit, and still says how many parts fit", async () => {
    const whole = await fits(base);
    const cut = await fits(base, { limit: 2 });
    expect(whole.partsThatFit).toBeGreaterThan(2);
    expect(cut.fits).toEqual(whole.fits.slice(0, 2));
    expect(cut.partsThatFit).toBe(whole.partsThatFit);
    const every = await fits(base, { distinct: "none", limit: 40 });
    expect(every.fits).toHaveLength(40);
    expect(every.fits[0]).toEqual(whole.fits[0]);
  });

  it("of parts named by id holds those alone", async () => {
    const named = ids.slice(2, 6);
    const answer = await fits({ ...base, parts: { ids: named } });
    for (const { part } of answer.fits) expect(named).toContain(part.id);
    expect(answer.passedOver.find(({ reason }) => reason === "part-filter")?.parts).toBe(PARTS - 4);
    expect((await fits({ ...base, parts: { ids: [] } })).fits).toEqual([]);
  });

  it("is a problem, not a stream, when a stream was asked for something wrong", async () => {
    const answer = await designer
      .post(`${BASE}/fits`)
      .set("accept", "application/x-ndjson")
      .send({ brief: { rail: { volts: 451 } } })
      .expect(422);
    expect(answer.headers["content-type"]).toMatch(/^application\/problem\+json/);
    expect(problemSchema.parse(answer.body).errors[0].path).toBe("brief.rail.volts");
  });
});

describe("a search called off before its answer, without a stream", () => {
  it("leaves the threads to the next, and nothing in the log", async () => {
    const server = createServer(api.app);
    await new Promise<void>((listening) => server.listen(0, "127.0.0.1", listening));
    const { port } = server.address() as AddressInfo;
    const signedIn = await fetch(`http://127.0.0.1:${port}${BASE}/auth/sign-in`, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify({ email: "designer@tidewater.example", password: "a long enough password" }),
    });
    const cookie = String(signedIn.headers.get("set-cookie")).split(";")[0];
    const series = { series: "E192" };
    const resistors = { divider: series, drain: series, source: series };
    const heavy = {
      rail: { volts: 12 },
      polarity: "either",
      distortion: { max: 1e-4, atPeak: 3 },
      resistors,
    };
    const begun = new Promise<void>((running) => server.once("request", () => running()));
    const call = httpRequest({
      host: "127.0.0.1",
      port,
      path: `${BASE}/fits`,
      method: "POST",
      headers: { "content-type": "application/json", cookie },
    });
    const closed = new Promise<void>((done) => call.once("close", done));
    call.on("error", () => undefined);
    call.end(JSON.stringify({ brief: heavy }));
    await begun;
    call.destroy();
    await closed;
    expect((await fits(base)).complete).toBe(true);
    expect(api.logged.filter(({ level }) => level >= 50)).toEqual([]);
    await new Promise((done) => server.close(done));
  });
});
