import type { Yield } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { pickResistors } from "#shared/schemas/circuit";
import type { Fit } from "#shared/schemas/fits";
import { type FitYieldsRequest, fitYieldsResponseSchema } from "#shared/schemas/yield";
import { callApi } from "../../lib/api";

/** Fits in one request: few enough that the first figures come at once. */
const GROUP_SIZE = 10;
const BUILDS = 10_000;
const SEED = 1;

type Wanted = {
  brief: Brief;
  fit: Fit;
  signal: AbortSignal;
  resolve: (value: Yield) => void;
  reject: (error: unknown) => void;
};

let waiting: Wanted[] = [];
let isSending = false;

/**
 * The yield of one fit, over 10,000 simulated builds. Fits asked for in one go are sent in groups, in the order they
 * were asked for and one group after another.
 *
 * @param signal takes the fit out of the queue; a request whose fits were all taken out is called off
 */
export function askForYield(brief: Brief, fit: Fit, signal: AbortSignal): Promise<Yield> {
  return new Promise((resolve, reject) => {
    waiting.push({ brief, fit, signal, resolve, reject });
    signal.addEventListener("abort", () => reject(signal.reason), { once: true });
    if (isSending) return;
    isSending = true;
    // Once every row of the table has asked.
    queueMicrotask(sendGroups);
  });
}

async function sendGroups(): Promise<void> {
  for (;;) {
    waiting = waiting.filter(({ signal }) => !signal.aborted);
    if (waiting.length === 0) break;
    const { brief } = waiting[0];
    const group = waiting.filter((wanted) => wanted.brief === brief).slice(0, GROUP_SIZE);
    waiting = waiting.filter((wanted) => !group.includes(wanted));
    await sendGroup(brief, group);
  }
  isSending = false;
}

async function sendGroup(brief: Brief, group: readonly Wanted[]): Promise<void> {
  const call = new AbortController();
  for (const { signal } of group) {
    signal.addEventListener("abort", () => {
      if (group.every((wanted) => wanted.signal.aborted)) call.abort(signal.reason);
    });
  }
  const fits = group.map(({ fit }) => ({ partId: fit.part.id, resistors: pickResistors(fit) }));
  const body: FitYieldsRequest = { brief, fits, builds: BUILDS, seed: SEED };
  try {
    const options = { method: "POST", body, schema: fitYieldsResponseSchema, signal: call.signal } as const;
    const { yields } = await callApi("/fits/yield", options);
    for (const [index, { resolve }] of group.entries()) resolve(yields[index]);
  } catch (error) {
    for (const { reject } of group) reject(error);
  }
}
