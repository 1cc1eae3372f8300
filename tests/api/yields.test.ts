import { createServer, request as httpRequest } from "node:http";
import type { AddressInfo } from "node:net";
import supertest from "supertest";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { SATURATED } from "#shared/bias/builds/conditions";
import { boxOf } from "#shared/bias/spread";
import type { Simulation } from "#shared/bias/yield";
import { spreadResponseSchema } from "#shared/schemas/bias";
import { briefSchema } from "#shared/schemas/brief";
import { fitYieldsResponseSchema, stageYieldResponseSchema } from "#shared/schemas/yield";
import { closeSimulation, simulateStages } from "../../api/simulation/pool";
import {
  type Agent,
  BASE,
  PASSWORD,
  SMALL_BRIEF,
  SMALL_RESISTORS,
  startTestApi,
  type TestApi,
  type TestTeam,
} from "../support/api";
import { buildPart } from "../support/build-part";
import { buildStageValues } from "../support/build-stage";

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
  own = (await api.addPart({ partNumber: "OWN-1", vtMin: 1.1, vtMax: 1.3 }, tidewater.id)).id;
});
afterAll(async () => {
  await closeSimulation();
  await api.stop();
});

const DEVICE = {
  polarity: "n",
  ...{ vtMin: 0.8, vtTyp: 1.2, vtMax: 1.8, kMin: 6e-3, kTyp: 10e-3, kMax: 14e-3 },
  lambda: 0.01,
};
const STAGE = { vdd: 12, ...SMALL_RESISTORS, rl: 10_000 };

describe("POST /bias/spread", () => {
  const spread = (body: object) => tidewater.as.viewer.post(`${BASE}/bias/spread`).send(body);

  it("answers the assured swing, the two builds that set it and the yield of saturated builds", async () => {
    const { body } = await spread({ device: DEVICE, stage: STAGE, builds: 3000 }).expect(200);
    const answer = spreadResponseSchema.parse(body);
    expect(answer.assured.symmetric).toBeGreaterThan(0);
    expect(answer.assured.symmetric).toBe(Math.min(answer.assured.towardCutoff, answer.assured.towardOhmic));
    expect(answer.corners.map(({ toward }) => toward)).toEqual(["cutoff", "ohmic"]);
    const [cutoff, ohmic] = answer.corners;
    expect(cutoff).toMatchObject({ vt: 1.8, k: 6e-3, room: answer.assured.towardCutoff });
    expect(cutoff.stage.vdd).toBeCloseTo(12 * 0.95, 9);
    expect(ohmic).toMatchObject({ vt: 0.8, room: answer.assured.towardOhmic });
    // Where every build inside the ranges swings, every simulated one is saturated.
    expect(answer.yield).toMatchObject({ fraction: 1, high: 1, builds: 3000 });
  });

  it("answers no swing and a yield below 1 where some builds don't conduct", async () => {
    // The gate stands at 1.2 V, in the middle of the thresholds.
    const stage = { ...STAGE, r1: 900_000, r2: 100_000 };
    const device = { ...DEVICE, vtMin: 0.9, vtMax: 1.5 };
    const { body } = await spread({ device, stage }).expect(200);
    expect(body.assured).toMatchObject({ towardCutoff: 0, symmetric: 0 });
    expect(body.yield.low).toBeLessThan(0.5);
    expect(body.yield.high).toBeGreaterThan(0.5);
  });

  it("stays finite where no build conducts at all", async () => {
    const device = { ...DEVICE, vtMin: 20, vtTyp: 21, vtMax: 22 };
    const { body } = await spread({ device, stage: STAGE, builds: 10 }).expect(200);
    expect(spreadResponseSchema.parse(body).assured).toEqual({
      towardCutoff: 0,
      towardOhmic: 0,
      symmetric: 0,
    });
  });

  it.each([
    [{ device: { ...DEVICE, vtMin: 1.3 } }, "device.vtMin"],
    [{ device: { ...DEVICE, kMax: 1e-3 } }, "device.kTyp"],
    [{ builds: 0 }, "builds"],
    [{ builds: 1_000_001 }, "builds"],
    [{ seed: -1 }, "seed"],
    [{ tolerance: { rail: 0.6 } }, "tolerance.rail"],
    [{ ambient: { min: 50, max: 20 } }, "ambient.min"],
  ])("refuses %j and names the field", async (wrong, path) => {
    const { body } = await spread({ device: DEVICE, stage: STAGE, ...wrong }).expect(422);
    expect(body.errors.map((error: { path: string }) => error.path)).toContain(path);
  });
});

describe("POST /fits/yield", () => {
  const wobbly = { ...SMALL_RESISTORS, r2: 220_000 };
  const ask = (agent: Agent, body: object) =>
    agent.post(`${BASE}/fits/yield`).send({ brief: SMALL_BRIEF, ...body });

  it("answers in the order of the fits, the same for the same seed", async () => {
    const fits = [
      { partId: shared, resistors: wobbly },
      { partId: own, resistors: SMALL_RESISTORS },
      { partId: shared, resistors: SMALL_RESISTORS },
      { partId: shared, resistors: wobbly },
    ];
    const { body } = await ask(tidewater.as.viewer, { fits, builds: 4000, seed: 5 }).expect(200);
    const { yields } = fitYieldsResponseSchema.parse(body);
    expect(yields).toHaveLength(4);
    expect(yields[3]).toEqual(yields[0]);
    // The narrower bin holds better than the wide one, and the centred values better than the others.
    expect(yields[1].fraction).toBeGreaterThan(yields[0].fraction);
    expect(yields[2].fraction).toBeGreaterThan(yields[0].fraction);
    for (const { fraction, low, high, builds } of yields) {
      expect(low).toBeLessThanOrEqual(fraction);
      expect(high).toBeGreaterThanOrEqual(fraction);
      expect(builds).toBe(4000);
    }
    const again = await ask(tidewater.as.viewer, { fits: fits.slice(0, 1), builds: 4000, seed: 5 }).expect(
      200,
    );
    expect(again.body.yields[0]).toEqual(yields[0]);
  });

  it("is 404 for another team's part, as for one that nobody has", async () => {
    const fits = (partId: number) => ({ fits: [{ partId, resistors: SMALL_RESISTORS }] });
    await ask(tidewater.as.designer, { ...fits(own), builds: 10 }).expect(200);
    const theirs = await ask(lantern.as.designer, fits(own)).expect(404);
    const none = await ask(lantern.as.designer, fits(999_999_999)).expect(404);
    expect({ ...theirs.body, requestId: "" }).toEqual({ ...none.body, requestId: "" });
  });

  const fit = { partId: 1, resistors: SMALL_RESISTORS };

  it.each([
    { name: "no fit", wrong: { fits: [] }, path: "fits" },
    { name: "101 fits", wrong: { fits: Array.from({ length: 101 }, () => fit) }, path: "fits" },
    { name: "200,001 builds", wrong: { fits: [fit], builds: 200_001 }, path: "builds" },
    {
      name: "a fit without R1",
      wrong: { fits: [{ ...fit, resistors: { ...SMALL_RESISTORS, r1: 0 } }] },
      path: "fits.0.resistors.r1",
    },
    {
      name: "a fit with another circuit's resistor",
      wrong: { fits: [fit, { ...fit, resistors: { ...SMALL_RESISTORS, rg: 1000 } }] },
      path: "fits.1.resistors.rg",
    },
  ])("refuses $name and names the field", async ({ wrong, path }) => {
    const { body } = await ask(tidewater.as.designer, wrong).expect(422);
    expect(body.errors.map((error: { path: string }) => error.path)).toContain(path);
  });

  it("leaves no trace when the caller goes", async () => {
    const server = createServer(api.app).listen(0, "127.0.0.1");
    await new Promise((listening) => server.once("listening", listening));
    const { port } = server.address() as AddressInfo;
    const credentials = { email: "designer@tidewater.example", password: PASSWORD };
    const signIn = await supertest(api.app).post(`${BASE}/auth/sign-in`).send(credentials).expect(204);
    const cookie = String(signIn.headers["set-cookie"][0]).split(";")[0];
    const fits = Array.from({ length: 100 }, () => ({ partId: shared, resistors: SMALL_RESISTORS }));
    const brief = { ...SMALL_BRIEF, distortion: { max: 0.5 } };
    await new Promise<void>((gone) => {
      const headers = { "content-type": "application/json", cookie };
      const call = httpRequest({ port, method: "POST", path: `${BASE}/fits/yield`, headers });
      call.on("error", () => undefined);
      server.once("request", (_request, response) => {
        response.once("close", () => gone());
        call.destroy();
      });
      call.end(JSON.stringify({ brief, fits, builds: 200_000 }));
    });
    const next = { fits: [{ partId: shared, resistors: SMALL_RESISTORS }], builds: 100 };
    await ask(tidewater.as.designer, next).expect(200);
    expect(api.logged.filter(({ level }) => level >= 50)).toEqual([]);
    await new Promise((closed) => server.close(closed));
  });
});

describe("simulating on the threads", () => {
  const simulation = (builds: number): Simulation => ({
    box: boxOf(
      buildPart(),
      briefSchema.parse(SMALL_BRIEF),
      buildStageValues({ ...SMALL_RESISTORS, rl: 10_000 }),
    ),
    conditions: SATURATED,
    readings: null,
    builds,
    seed: 1,
  });

  it("stops when it is called off, and leaves the threads to the next", async () => {
    // More builds than the test has time for.
    const endless = Array.from({ length: 20 }, () => simulation(1e12));
    const controller = new AbortController();
    const answer = simulateStages(endless, { signal: controller.signal });
    // The next would wait for ever behind these.
    controller.abort(new Error("nobody waits"));
    await expect(answer).rejects.toThrow("nobody waits");
    const more = Array.from({ length: 20 }, () => simulation(100));
    const outcomes = await simulateStages(more, { signal: new AbortController().signal });
    expect(outcomes.map((outcome) => outcome.yield.builds)).toEqual(more.map(() => 100));
  });

  it("is not begun for a caller already gone", async () => {
    const signal = AbortSignal.abort(new Error("gone before"));
    await expect(simulateStages([simulation(1e12)], { signal })).rejects.toThrow("gone before");
  });
});

describe("POST /stages/:id/yield", () => {
  const keep = async (resistors: object) => {
    const stage = { name: "A stage", partId: own, resistors, brief: SMALL_BRIEF };
    return (await tidewater.as.designer.post(`${BASE}/stages`).send(stage).expect(201)).body.id as number;
  };
  const ask = (agent: Agent, id: number, body: object = {}) =>
    agent.post(`${BASE}/stages/${id}/yield`).send(body);

  it("speaks for the kept part and brief, or for the values tried", async () => {
    const id = await keep(SMALL_RESISTORS);
    const { body } = await ask(tidewater.as.viewer, id).expect(200);
    const kept = stageYieldResponseSchema.parse(body);
    const fits = [{ partId: own, resistors: SMALL_RESISTORS }];
    const fit = await tidewater.as.viewer.post(`${BASE}/fits/yield`).send({ brief: SMALL_BRIEF, fits });
    expect(kept.yield).toEqual(fit.body.yields[0]);
    const resistors = { ...SMALL_RESISTORS, r2: 120_000 };
    const tried = stageYieldResponseSchema.parse((await ask(tidewater.as.viewer, id, { resistors })).body);
    expect(tried.yield.fraction).toBeLessThan(kept.yield.fraction);
    expect(tried.costliest?.fraction).toBeGreaterThan(tried.yield.fraction);
  });

  it("refuses values that are not its circuit's", async () => {
    const id = await keep(SMALL_RESISTORS);
    const resistors = { ...SMALL_RESISTORS, rg: 1000 };
    const { body } = await ask(tidewater.as.designer, id, { resistors }).expect(422);
    expect(body.errors).toMatchObject([{ path: "resistors.rg" }]);
  });

  it("is 404 for another team and once the stage is deleted", async () => {
    const id = await keep(SMALL_RESISTORS);
    await ask(lantern.as.owner, id).expect(404);
    await tidewater.as.designer.delete(`${BASE}/stages/${id}`).expect(204);
    await ask(tidewater.as.designer, id).expect(404);
  });
});
