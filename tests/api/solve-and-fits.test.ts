import { createServer, request as httpRequest } from "node:http";
import type { AddressInfo } from "node:net";
import supertest from "supertest";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type FitsResponse, fitsEventSchema, fitsResponseSchema } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";
import { valuesBetween } from "#shared/values/e-series";
import { resistorOrderables } from "../../api/db/schema/orderables";
import { closePool } from "../../api/ranking/pool";
import published from "../reference/checks/published.json";
import { tryEveryCombination } from "../reference/plain-loop";
import { type Agent, BASE, SMALL_BRIEF, startTestApi, type TestApi } from "../support/api";
import { randomParts } from "../support/build-part";
import { seededRandom } from "../support/random";

let api: TestApi;
let designer: Agent;
const catalog: Part[] = [];

beforeAll(async () => {
  api = await startTestApi();
  designer = (await api.addTeam("tidewater")).as.designer;
  for (const part of randomParts(seededRandom(11), 25))
    catalog.push(await api.addPart({ ...part, vdss: 60 }));
  await api.db.insert(resistorOrderables).values(
    [2700, 3300].map((ohms) => ({
      orderableNumber: `R-${ohms}`,
      maker: "Test Row",
      tolerance: 0.01,
      size: "0805",
      voltageRating: 150,
      stock: ohms === 2700 ? 100 : 0,
      leadTimeWeeks: 4,
      priceBreaks: [],
      family: "thick film" as const,
      series: "E24" as const,
      ohms,
      powerRating: 0.125,
      ppmPerKelvin: 100,
    })),
  );
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

describe("POST /bias/solve", () => {
  const solve = (body: object) => designer.post(`${BASE}/bias/solve`).send(body);
  const example = published.cases.find(({ id }) => id === "divider-5v") as unknown as {
    device: object;
    stage: object;
    result: { id: number; vds: number };
  };

  it("agrees with a published example (FOSSEE Scilab Textbook Companion 2342, example 5.26)", async () => {
    const { body } = await solve({ device: example.device, stage: example.stage }).expect(200);
    expect(body.region).toBe("saturation");
    expect(body.id).toBeCloseTo(example.result.id, 7);
    expect(body.vds).toBeCloseTo(example.result.vds, 4);
    expect(body.distortion).toBeUndefined();
  });

  it("answers magnitudes for a P-channel device, and distortion with an input peak", async () => {
    const device = { ...example.device, polarity: "p" };
    const { body } = await solve({ device, stage: example.stage, inputPeak: 0.1 }).expect(200);
    expect(body.id).toBeGreaterThan(0);
    expect(body.gain).toBeLessThan(0);
    // Square law, source bypassed: A/(4 VOV).
    expect(body.distortion.secondHarmonic).toBeCloseTo(0.1 / (4 * body.overdrive), 9);
  });

  it.each([
    [{ vdd: 0.4 }, "stage.vdd"],
    [{ vdd: 450.1 }, "stage.vdd"],
    [{ r1: 0.09 }, "stage.r1"],
    [{ rd: 1.1e8 }, "stage.rd"],
    [{ rs: -1 }, "stage.rs"],
    [{ rl: 0 }, "stage.rl"],
    [{ extra: 1 }, "stage.extra"],
  ])("refuses %j at the field", async (change, path) => {
    const { body } = await solve({ device: example.device, stage: { ...example.stage, ...change } }).expect(
      422,
    );
    expect(body.errors.map((error: { path: string }) => error.path)).toEqual([path]);
  });
});

describe("POST /fits", () => {
  const fits = async (body: object) =>
    fitsResponseSchema.parse((await designer.post(`${BASE}/fits`).send(body).expect(200)).body);
  const withoutTime = ({ elapsedMs: _elapsed, ...rest }: FitsResponse) => rest;

  it("gives the best fit of each part, and speaks for every part", async () => {
    const answer = await fits({ brief: { ...SMALL_BRIEF, polarity: "n" } });
    expect(answer.complete).toBe(true);
    expect(answer.fits.length).toBe(answer.partsThatFit);
    expect(new Set(answer.fits.map(({ part }) => part.id)).size).toBe(answer.fits.length);
    const passedOver = answer.passedOver.reduce((sum, { parts }) => sum + parts, 0);
    expect(passedOver + answer.partsThatFit).toBe(catalog.length);
    for (const fit of answer.fits) {
      expect(fit.bias.swing?.symmetric).toBeGreaterThanOrEqual(1);
      expect(fit.cautions.map(({ code }) => code)).toContain("verify-on-bench");
    }
  });

  it("with distinct none gives the same list as trying every combination", async () => {
    const brief = {
      ...SMALL_BRIEF,
      polarity: "either",
      parts: { ids: catalog.slice(0, 3).map(({ id }) => id) },
    };
    const answer = await fits({ brief, distinct: "none", limit: 5000 });
    const expected = tryEveryCombination(
      {
        circuit: "four-resistor",
        objective: "centred",
        vdd: 12,
        vss: 0,
        load: 10e3,
        sourceImpedance: 0,
        bypassed: true,
        values: {
          r1: valuesBetween("E12", 100e3, 1e6),
          r2: valuesBetween("E12", 100e3, 1e6),
          rd: valuesBetween("E12", 1e3, 10e3),
          rs: valuesBetween("E12", 100, 1e3),
        },
        resistorTolerance: 0.01,
        railTolerance: 0.05,
        ambient: [25, 25],
        swingPeak: 1,
        deratingVds: 0.8,
        deratingPower: 0.5,
        resistorPower: 0.5 * 0.125,
      },
      catalog.slice(0, 3),
    );
    expect(expected.length).toBeGreaterThan(50);
    expect(answer.fits.map(({ part, r1, r2, rd, rs }) => [part.id, r1, r2, rd, rs])).toEqual(
      expected.slice(0, 5000).map(({ partId, r1, r2, rd, rs }) => [partId, r1, r2, rd, rs]),
    );
  });

  it("takes only values in stock when asked to", async () => {
    const stocked = { ...SMALL_BRIEF, resistors: { drain: { min: 1000, max: 10_000 }, stockedOnly: true } };
    // Nothing but 2.7 kΩ is in stock, so there is no divider.
    const answer = await fits({ brief: stocked });
    expect(answer.fits).toEqual([]);
    expect(answer.considered).toBe(0);
  });

  it("streams progress and then the same answer", async () => {
    // A brief that no other test asks for, so that it is ranked and not remembered.
    const body = { brief: { ...SMALL_BRIEF, polarity: "either", swing: { peak: 0.9 } } };
    const streamed = await designer
      .post(`${BASE}/fits`)
      .set("accept", "application/x-ndjson")
      .buffer(true)
      .parse((response, done) => {
        let text = "";
        response.on("data", (chunk) => {
          text += chunk;
        });
        response.on("end", () => done(null, text));
      })
      .send(body)
      .expect(200);
    const events = String(streamed.body)
      .trim()
      .split("\n")
      .map((line) => fitsEventSchema.parse(JSON.parse(line)));
    const last = events.pop();
    expect(events.length).toBeGreaterThan(0);
    expect(events.some((event) => "progress" in event)).toBe(true);
    expect(events.some((event) => "result" in event)).toBe(false);
    if (!last || !("result" in last)) throw new Error("The stream did not end with its result");
    expect(withoutTime(last.result)).toEqual(withoutTime(await fits(body)));
  });

  it("is called off when the caller hangs up, without a word in the log", async () => {
    const server = createServer(api.app);
    await new Promise<void>((listening) => server.listen(0, "127.0.0.1", listening));
    const { port } = server.address() as AddressInfo;
    const signIn = await supertest(server)
      .post(`${BASE}/auth/sign-in`)
      .send({ email: "designer@tidewater.example", password: "a long enough password" });
    const heavy = {
      brief: {
        rail: { volts: 12 },
        polarity: "either",
        distortion: { max: 0.0001, atPeak: 3 },
        resistors: { divider: { series: "E96" }, drain: { series: "E96" }, source: { series: "E96" } },
      },
    };
    await new Promise<void>((closed) => {
      const call = httpRequest(
        {
          host: "127.0.0.1",
          port,
          path: `${BASE}/fits`,
          method: "POST",
          headers: {
            "content-type": "application/json",
            accept: "application/x-ndjson",
            cookie: String(signIn.headers["set-cookie"][0]).split(";")[0],
          },
        },
        (response) => {
          // The first line of progress says that the search runs.
          response.once("data", () => call.destroy());
          response.once("close", closed);
          response.on("error", () => undefined);
        },
      );
      call.on("error", () => undefined);
      call.end(JSON.stringify(heavy));
    });
    // The threads are free again: a small search is answered.
    expect((await fits({ brief: SMALL_BRIEF })).complete).toBe(true);
    expect(api.logged.filter(({ level }) => level >= 50)).toEqual([]);
    await new Promise((closed) => server.close(closed));
  });

  it("says what to relax when nothing fits; relaxed like that, something does", async () => {
    const random = seededRandom(77);
    for (let trial = 0; trial < 10; trial++) {
      const brief = {
        ...SMALL_BRIEF,
        polarity: "either",
        swing: { peak: random.between(1, 3) },
        gain: { min: random.between(400, 900) },
      };
      const answer = await fits({ brief });
      expect(answer.fits).toEqual([]);
      expect(answer.relax).toMatchObject({ condition: "gain", path: "gain.min", stated: brief.gain.min });
      const relaxed = { ...brief, gain: { min: answer.relax?.needed } };
      expect((await fits({ brief: relaxed })).fits.length).toBeGreaterThan(0);
    }
  });

  it("refuses what it doesn't know", async () => {
    const refused = async (body: object) =>
      (await designer.post(`${BASE}/fits`).send(body).expect(422)).body.errors.map(
        ({ path }: { path: string }) => path,
      );
    expect(await refused({ brief: SMALL_BRIEF, objective: "luck" })).toEqual(["objective"]);
    expect(await refused({ brief: SMALL_BRIEF, distinct: "maker" })).toEqual(["distinct"]);
    expect(await refused({ brief: SMALL_BRIEF, limit: 0 })).toEqual(["limit"]);
    expect(await refused({})).toEqual(["brief"]);
  });
});

describe("problems", () => {
  it("are RFC 9457 documents with a code and a request id", async () => {
    const cases: [supertest.Test, number, string][] = [
      [designer.get(`${BASE}/nowhere`), 404, "not_found"],
      [designer.post(`${BASE}/briefs`).set("content-type", "application/json").send("{"), 400, "bad_json"],
      [designer.post(`${BASE}/briefs`).send({ name: "x".repeat(300_000) }), 413, "too_large"],
      [designer.get(`${BASE}/briefs/zero`), 422, "invalid"],
    ];
    for (const [call, status, code] of cases) {
      const response = await call;
      expect(response.status).toBe(status);
      expect(response.headers["content-type"]).toMatch(/^application\/problem\+json/);
      expect(response.body).toMatchObject({ status, code, errors: expect.any(Array) });
      expect(response.body.requestId).toMatch(/^[0-9a-f-]{36}$/);
      expect(response.headers["cache-control"]).toBe("no-store");
    }
  });

  it("tell nothing of the inside when something unforeseen happens", async () => {
    const broken = { ...api.surroundings, sessions: { ...api.surroundings.sessions, identify: explode } };
    const { createApp } = await import("../../api/app");
    const response = await supertest(createApp(broken)).get(`${BASE}/briefs`).expect(500);
    expect(JSON.stringify(response.body)).not.toMatch(/secret|stack|at /);
    expect(response.body.code).toBe("unforeseen");
  });

  function explode(): Promise<never> {
    throw new Error("a secret of the inside");
  }
});
