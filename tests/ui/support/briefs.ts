import { screen } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import type { Yield } from "#shared/schemas/bias";
import { briefSchema, type SavedBrief } from "#shared/schemas/brief";
import type { Fit, FitsRequest, FitsResponse } from "#shared/schemas/fits";
import type { FitYieldsRequest } from "#shared/schemas/yield";
import { buildResistors } from "../../support/build-stage";
import type { renderAt } from "./render";
import { API, server } from "./server";

export const BRIEF = briefSchema.parse({ rail: { volts: 12 }, load: { ohms: 10e3 }, swing: { peak: 1.5 } });

export function buildSaved(overrides: Partial<SavedBrief> = {}): SavedBrief {
  const someone = { id: "u1", name: "S. Omeone" };
  return {
    id: 7,
    name: "First stage",
    version: 3,
    brief: BRIEF,
    createdBy: someone,
    updatedBy: someone,
    createdAt: "2026-11-02T09:00:00.000Z",
    updatedAt: "2026-11-03T09:00:00.000Z",
    ...overrides,
  };
}

export function buildFit(id: number, partNumber: string, symmetric: number): Fit {
  return {
    part: {
      id,
      partNumber,
      maker: "Test Row",
      polarity: "n",
      package: "SOT-23",
      mounting: "surface",
      lifecycle: "active",
      stock: 1200,
      unitPrice: 11,
    },
    ...buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 }),
    bias: {
      region: "saturation",
      vg: 3.53,
      vgs: 1.26,
      overdrive: 0.36,
      id: 1.89e-3,
      vds: 4.62,
      transition: { id: 3.8e-3, vds: 0.52 },
      swing: { towardCutoff: symmetric, towardOhmic: symmetric + 0.1, symmetric },
      centringError: 0.012,
      gm: 10e-3,
      ro: 50e3,
      gain: -21.9,
      inputResistance: 529e3,
      outputResistance: 2600,
      power: 8.7e-3,
    },
    supplyCurrent: 1.9e-3,
    highCorner: 2e6,
    distortion: null,
    assured: { towardCutoff: 0.5 * symmetric, towardOhmic: 0.6 * symmetric, symmetric: 0.5 * symmetric },
    cost: null,
    cautions: [],
  };
}

export function buildAnswer(overrides: Partial<FitsResponse> = {}): FitsResponse {
  return {
    fits: [buildFit(1, "AAA-1", 4.02), buildFit(2, "BBB-2", 3.5)],
    considered: 35_437_621_248,
    partsThatFit: 2,
    complete: true,
    passedOver: [{ reason: "swing", parts: 331, message: "No resistors give 1.5 V peak both ways." }],
    relax: null,
    elapsedMs: 90,
    ...overrides,
  };
}

/** Answers each request for yields with the same one for every fit; keeps what was asked. */
export function playYields(one: Partial<Yield> = {}): FitYieldsRequest[] {
  const asked: FitYieldsRequest[] = [];
  server.use(
    http.post(`${API}/fits/yield`, async ({ request }) => {
      const body = (await request.json()) as FitYieldsRequest;
      asked.push(body);
      const answer: Yield = { fraction: 0.973, low: 0.9697, high: 0.976, builds: body.builds, ...one };
      return HttpResponse.json({ yields: body.fits.map(() => answer) });
    }),
  );
  return asked;
}

/** Answers each ranking as lines: progress, then the result; keeps what was asked. Yields are played too. */
export function playRanking(...answers: FitsResponse[]): FitsRequest[] {
  const asked: FitsRequest[] = [];
  playYields();
  server.use(
    http.post(`${API}/fits`, async ({ request }) => {
      asked.push((await request.json()) as FitsRequest);
      const result = answers[Math.min(asked.length, answers.length) - 1];
      if (!request.headers.get("accept")?.includes("ndjson")) return HttpResponse.json(result);
      const lines = [{ progress: { partsDone: 10, partsTotal: 333 } }, { result }];
      return new HttpResponse(lines.map((line) => `${JSON.stringify(line)}\n`).join(""), {
        headers: { "content-type": "application/x-ndjson" },
      });
    }),
  );
  return asked;
}

export async function fill(user: ReturnType<typeof renderAt>["user"], label: string, text: string) {
  const blank = await screen.findByRole("textbox", { name: label });
  await user.clear(blank);
  await user.type(blank, `${text}{Tab}`);
}
