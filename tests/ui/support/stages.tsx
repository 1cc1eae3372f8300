import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import type { Stage, UpdateStage } from "#shared/schemas/stage";
import type { StageYieldResponse } from "#shared/schemas/yield";
import { StagePage } from "../../../web/features/stages/stage-page";
import { StagesPage } from "../../../web/features/stages/stages-page";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";
import type { renderAt } from "./render";
import { API, server } from "./server";

export const BRIEF: Brief = briefSchema.parse({
  rail: { volts: 12 },
  load: { ohms: 10e3 },
  swing: { peak: 1 },
  ambient: { min: 0, max: 50 },
});
export const PART = buildPart();
export const RESISTORS = buildResistors({ r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 });

export function buildStage(overrides: Partial<Stage> = {}): Stage {
  const someone = { id: "u1", name: "S. Omeone" };
  return {
    id: 4,
    name: "First stage",
    note: "Mind the cold.",
    version: 3,
    part: PART,
    resistors: RESISTORS,
    brief: BRIEF,
    origin: { briefId: 7, briefName: "First brief", briefVersion: 2 },
    createdBy: someone,
    updatedBy: someone,
    createdAt: "2026-11-02T09:00:00.000Z",
    updatedAt: "2026-11-03T09:00:00.000Z",
    ...overrides,
  };
}

export const PAGES = { "/stages/:id": <StagePage />, "/stages": <StagesPage /> };

/** What the server says of a stage's builds. */
export const YIELD: StageYieldResponse = {
  yield: { fraction: 0.957, low: 0.954, high: 0.96, builds: 20_000 },
  costliest: { parameter: "vt", fraction: 0.998 },
};

/** Plays one kept stage; answers each save with the next version. */
export function playStage(stage = buildStage()): UpdateStage[] {
  const saved: UpdateStage[] = [];
  server.use(
    http.get(`${API}/stages/4`, () => HttpResponse.json(stage)),
    http.post(`${API}/stages/4/yield`, () => HttpResponse.json(YIELD)),
    http.put(`${API}/stages/4`, async ({ request }) => {
      const change = (await request.json()) as UpdateStage;
      saved.push(change);
      return HttpResponse.json({ ...stage, ...change, version: change.version + 1 });
    }),
  );
  return saved;
}

/** Plays a stage that R. Other has changed since it was opened: only an edit of their version is taken. */
export function playStaleStage(theirs: Partial<Stage>): UpdateStage[] {
  const saved = playStage();
  const current = buildStage({ ...theirs, version: 4 });
  server.use(
    http.put(`${API}/stages/4`, async ({ request }) => {
      const change = (await request.json()) as UpdateStage;
      saved.push(change);
      if (change.version === 4) return HttpResponse.json({ ...current, ...change, version: 5 });
      const problem = {
        type: "about:blank",
        title: "Changed meanwhile",
        status: 409,
        code: "stage.version_conflict",
        detail: "R. Other changed this stage meanwhile.",
        errors: [],
        current,
      };
      return HttpResponse.json(problem, { status: 409 });
    }),
  );
  return saved;
}

export async function rename(user: User, name: string) {
  await user.click(await screen.findByRole("button", { name: /rename/ }));
  const box = within(await screen.findByRole("dialog")).getByLabelText("Name");
  await user.clear(box);
  await user.type(box, name);
  await user.click(screen.getByRole("button", { name: "Save" }));
}

/** The value that a resistor's stepper shows. */
export function shown(resistor: string): string | null {
  return within(screen.getByRole("group", { name: resistor })).getByRole("status").textContent;
}

/** The figure beside a name on the sheet. */
export async function figure(name: string): Promise<string> {
  const link = await screen.findByRole("link", { name });
  return link.closest("dt")?.nextElementSibling?.textContent ?? "";
}

export type User = ReturnType<typeof renderAt>["user"];

export async function step(user: User, name: string, way: "higher" | "lower") {
  const group = await screen.findByRole("group", { name });
  await user.click(within(group).getByRole("button", { name: new RegExp(`^${name} ${way}`) }));
  return within(group).getByRole("status").textContent;
}
