import type { CreateBrief, SavedBrief, UpdateBrief } from "#shared/schemas/brief";
import type { Queryable } from "../../db/client";
import { changedFields } from "../../http/changes";
import type { SignedInContext } from "../../http/context";
import { conflict, notFound } from "../../http/problem";
import {
  insertBrief,
  markDeleted,
  markRestored,
  selectBrief,
  selectBriefs,
  selectVersion,
  updateBrief,
} from "./queries";

/** The team's briefs, the latest change first. */
export async function listBriefs({ db, actor }: SignedInContext): Promise<{ items: SavedBrief[] }> {
  return { items: await selectBriefs(db, actor.team.id) };
}

export function getBrief({ db, actor }: SignedInContext, id: number): Promise<SavedBrief> {
  return readBrief(db, actor.team.id, id);
}

export function createBrief({ db, actor, clock }: SignedInContext, input: CreateBrief): Promise<SavedBrief> {
  return db.transaction(async (transaction) => {
    const id = await insertBrief(transaction, actor.team.id, {
      ...input,
      userId: actor.user.id,
      now: clock(),
    });
    return readBrief(transaction, actor.team.id, id);
  });
}

/**
 * Saves the next version of a brief.
 *
 * @throws a conflict that names what changed, when the version edited is no longer the latest
 */
export function saveBrief(
  { db, actor, clock }: SignedInContext,
  id: number,
  { version, ...input }: UpdateBrief,
): Promise<SavedBrief> {
  return db.transaction(async (transaction) => {
    const edit = { ...input, userId: actor.user.id, now: clock() };
    if (!(await updateBrief(transaction, actor.team.id, id, version, edit))) {
      const current = await readBrief(transaction, actor.team.id, id);
      const edited = await selectVersion(transaction, actor.team.id, id, version);
      throw conflict(
        "brief.version_conflict",
        `${current.updatedBy.name} saved version ${current.version} meanwhile.`,
        edited ? changedFields(edited, { name: current.name, brief: current.brief }) : [],
        current,
      );
    }
    return readBrief(transaction, actor.team.id, id);
  });
}

export async function deleteBrief({ db, actor, clock }: SignedInContext, id: number): Promise<undefined> {
  if (!(await markDeleted(db, actor.team.id, id, clock()))) throw notFound("This brief");
}

/** Undoes a deletion. */
export async function restoreBrief({ db, actor }: SignedInContext, id: number): Promise<SavedBrief> {
  if (!(await markRestored(db, actor.team.id, id))) throw notFound("A deleted brief with this number");
  return readBrief(db, actor.team.id, id);
}

async function readBrief(db: Queryable, teamId: number, id: number): Promise<SavedBrief> {
  const brief = await selectBrief(db, teamId, id);
  if (!brief) throw notFound("This brief");
  return brief;
}
