import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type FitsRequest, type FitsResponse, fitsRequestSchema } from "#shared/schemas/fits";
import { findFits } from "../../api/features/fits/service";
import { type FitsControl, SharedSearches } from "../../api/features/fits/shared-searches";
import { selectAllParts } from "../../api/features/parts/queries";
import type { SignedInContext } from "../../api/http/context";
import { closePool } from "../../api/ranking/pool";
import { rankFits } from "../../api/ranking/rank-fits";
import { SMALL_BRIEF, startTestApi, type TestApi, type TestTeam } from "../support/api";
import { randomParts } from "../support/build-part";
import { seededRandom } from "../support/random";

let api: TestApi;
let tidewater: TestTeam;
let lantern: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  tidewater = await api.addTeam("tidewater");
  lantern = await api.addTeam("lantern");
  for (const part of randomParts(seededRandom(21), 30)) await api.addPart({ ...part, vdss: 60 });
});
afterAll(async () => {
  await closePool();
  await api.stop();
});

/** A new request's context, as a designer of a team has it. */
function contextOf({ id, name }: TestTeam): SignedInContext {
  const email = `designer@${name}.example`;
  return {
    ...api.surroundings,
    requestId: "test",
    address: "127.0.0.1",
    actor: {
      sessionId: "test",
      user: { id: email, email, name: "The designer" },
      team: { id, name },
      roles: ["designer"],
    },
  };
}

/** A request that no other test makes, told apart by the swing it asks for. */
function requestFor(peak: number): FitsRequest {
  return fitsRequestSchema.parse({ brief: { ...SMALL_BRIEF, polarity: "either", swing: { peak } } });
}

const withoutTime = ({ elapsedMs: _elapsed, ...rest }: FitsResponse) => rest;

/** Asks, and says when the search has told its first progress. */
function ask(team: TestTeam, request: FitsRequest, signal?: AbortSignal) {
  let told = () => {};
  const underWay = new Promise<void>((resolve) => {
    told = resolve;
  });
  const answer = findFits(contextOf(team), request, { signal, onProgress: () => told() });
  return { underWay, answer };
}

describe("the same brief asked for while it is ranked", () => {
  it("waits for that ranking, and gets what an unshared one finds", async () => {
    const request = requestFor(1.1);
    const twins = [1, 2, 3].map(() => ask(tidewater, request));
    const [first, ...others] = await Promise.all(twins.map(({ answer }) => answer));
    for (const other of others) expect(other).toBe(first);
    const supply = { rating: 0.1, stocked: null, prices: new Map() };
    const alone = await rankFits(request, await selectAllParts(api.db, tidewater.id), supply);
    expect(first.fits.length).toBeGreaterThan(3);
    expect(withoutTime(first)).toEqual(withoutTime(alone));
  });

  it("goes on for the one when the other has hung up", async () => {
    const request = requestFor(1.2);
    const hangUp = new AbortController();
    const first = ask(tidewater, request, hangUp.signal);
    const second = ask(tidewater, request);
    await Promise.all([first.underWay, second.underWay]);
    hangUp.abort(new Error("gone"));
    await expect(first.answer).rejects.toThrow("gone");
    const answer = await second.answer;
    expect(answer.complete).toBe(true);
    expect(answer.fits.length).toBeGreaterThan(3);
    // It was kept as well: whoever asks again gets the very same.
    expect(await ask(lantern, request).answer).not.toBe(answer);
    expect(await ask(tidewater, request).answer).toBe(answer);
  });

  it("is ranked anew after all have hung up", async () => {
    const request = requestFor(1.3);
    const hangUp = new AbortController();
    const first = ask(tidewater, request, hangUp.signal);
    await first.underWay;
    hangUp.abort(new Error("gone"));
    const [gone, again] = await Promise.allSettled([first.answer, ask(tidewater, request).answer]);
    expect(gone).toMatchObject({ status: "rejected", reason: new Error("gone") });
    expect(again).toMatchObject({ status: "fulfilled", value: { complete: true } });
  });
});

describe("searches under way", () => {
  /** A search that runs until it is told to end, and keeps what it was given. */
  function controlled() {
    const started: Required<FitsControl>[] = [];
    const endings: ((answer: FitsResponse) => void)[] = [];
    const start = (control: Required<FitsControl>) => {
      started.push(control);
      return new Promise<FitsResponse>((resolve, reject) => {
        endings.push(resolve);
        control.signal.addEventListener("abort", () => reject(control.signal.reason));
      });
    };
    return { searches: new SharedSearches(), start, started, endings };
  }
  const ANSWER = { fits: [], considered: 0, partsThatFit: 0, complete: true } as unknown as FitsResponse;

  it("are called off by the last to leave, not by the first", async () => {
    const { searches, start, started } = controlled();
    const [one, two] = [new AbortController(), new AbortController()];
    const first = searches.join("brief", { signal: one.signal }, start);
    const second = searches.join("brief", { signal: two.signal }, start);
    expect(started.length).toBe(1);
    one.abort(new Error("one left"));
    await expect(first).rejects.toThrow("one left");
    expect(started[0].signal.aborted).toBe(false);
    two.abort(new Error("two left"));
    await expect(second).rejects.toThrow("two left");
    expect(started[0].signal.aborted).toBe(true);
  });

  it("tell whoever comes later how far they have come, and those who left nothing more", async () => {
    const { searches, start, started, endings } = controlled();
    const heard: Record<string, number[]> = { early: [], late: [] };
    const hear = (name: string, signal?: AbortSignal): FitsControl => ({
      signal,
      onProgress: ({ partsDone }) => heard[name].push(partsDone),
    });
    const hangUp = new AbortController();
    const early = searches.join("brief", hear("early", hangUp.signal), start);
    started[0].onProgress({ partsDone: 3, partsTotal: 9 });
    const late = searches.join("brief", hear("late"), start);
    started[0].onProgress({ partsDone: 6, partsTotal: 9 });
    hangUp.abort(new Error("gone"));
    await expect(early).rejects.toThrow("gone");
    started[0].onProgress({ partsDone: 9, partsTotal: 9 });
    endings[0](ANSWER);
    expect(await late).toBe(ANSWER);
    expect(heard).toEqual({ early: [3, 6], late: [3, 6, 9] });
  });

  it("fail for all who wait, and are begun anew by the next", async () => {
    const { searches, start, started, endings } = controlled();
    const failing = () => Promise.reject(new Error("broken"));
    const both = [searches.join("brief", {}, failing), searches.join("brief", {}, start)];
    for (const caller of both) await expect(caller).rejects.toThrow("broken");
    expect(started.length).toBe(0);
    const next = searches.join("brief", {}, start);
    expect(started.length).toBe(1);
    endings[0](ANSWER);
    expect(await next).toBe(ANSWER);
  });

  it("are not begun for a caller who has gone already, nor shared between different briefs", async () => {
    const { searches, start, started, endings } = controlled();
    await expect(
      searches.join("brief", { signal: AbortSignal.abort(new Error("gone")) }, start),
    ).rejects.toThrow("gone");
    expect(started.length).toBe(0);
    const two = [searches.join("one", {}, start), searches.join("another", {}, start)];
    expect(started.length).toBe(2);
    for (const end of endings) end(ANSWER);
    expect(await Promise.all(two)).toEqual([ANSWER, ANSWER]);
  });
});
