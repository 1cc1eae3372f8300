import { resistorIssues } from "#shared/schemas/circuit";
import type { KeepStage, Stage, UpdateStage } from "#shared/schemas/stage";
import type { Queryable } from "../../db/client";
import { changedFields } from "../../http/changes";
import type { SignedInContext } from "../../http/context";
import { conflict, invalid, notFound } from "../../http/problem";
import { getBrief } from "../briefs/service";
import { getPart } from "../parts/service";
import { insertStage, markDeleted, markRestored, selectStage, selectStages, updateStage } from "./queries";

/** The team's kept stages, the latest change first. */
export async function listStages({ db, actor }: SignedInContext): Promise<{ items: Stage[] }> {
  return { items: await selectStages(db, actor.team.id) };
}

export function getStage({ db, actor }: SignedInContext, id: number): Promise<Stage> {
  return readStage(db, actor.team.id, id);
}

/** Keeps a fit: the part's figures are frozen as they are now, whatever becomes of the catalog. */
export async function keepStage(context: SignedInContext, input: KeepStage): Promise<Stage> {
  const { db, actor, clock } = context;
  requireResistors(input);
  const part = await getPart(context, input.partId);
  const brief = input.briefId === null ? null : await getBrief(context, input.briefId);
  const stage = {
    name: input.name,
    note: input.note,
    part,
    resistors: input.resistors,
    brief: input.brief,
    origin: brief && { briefId: brief.id, briefName: brief.name, briefVersion: brief.version },
  };
  return db.transaction(async (transaction) => {
    const id = await insertStage(transaction, actor.team.id, stage, actor.user.id, clock());
    return readStage(transaction, actor.team.id, id);
  });
}

/**
 * Renames a stage, notes something on it or changes its values.
 *
 * @throws a conflict that names what differs, when the version edited is no longer the latest; a 422 problem for resistors
 *   that the stage's brief rules out
 */
export function saveStage(
  { db, actor, clock }: SignedInContext,
  id: number,
  { version, ...input }: UpdateStage,
): Promise<Stage> {
  return db.transaction(async (transaction) => {
    const change = { ...input, userId: actor.user.id, now: clock() };
    if (!(await updateStage(transaction, actor.team.id, id, version, change))) {
      const current = await readStage(transaction, actor.team.id, id);
      const { name, note, resistors } = current;
      throw conflict(
        "stage.version_conflict",
        `${current.updatedBy.name} changed this stage meanwhile.`,
        changedFields(input, { name, note, resistors }),
        current,
      );
    }
    const saved = await readStage(transaction, actor.team.id, id);
    requireResistors(saved);
    return saved;
  });
}

/** Refuses resistors that are not those of the brief's circuit. */
function requireResistors({ brief, resistors }: Pick<Stage, "brief" | "resistors">): void {
  const issues = resistorIssues(brief.circuit, resistors).map(({ key, message }) => ({
    path: `resistors.${key}`,
    message,
  }));
  if ((brief.sourceResistor === "none") !== (resistors.rs === 0)) {
    const message = "RS is 0 exactly where the brief asks for no source resistor";
    issues.push({ path: "resistors.rs", message });
  }
  if (issues.length > 0) throw invalid(issues);
}

export async function deleteStage({ db, actor, clock }: SignedInContext, id: number): Promise<undefined> {
  if (!(await markDeleted(db, actor.team.id, id, clock()))) throw notFound("This stage");
}

/** Undoes a deletion. */
export async function restoreStage({ db, actor }: SignedInContext, id: number): Promise<Stage> {
  if (!(await markRestored(db, actor.team.id, id))) throw notFound("A deleted stage with this number");
  return readStage(db, actor.team.id, id);
}

async function readStage(db: Queryable, teamId: number, id: number): Promise<Stage> {
  const stage = await selectStage(db, teamId, id);
  if (!stage) throw notFound("This stage");
  return stage;
}
