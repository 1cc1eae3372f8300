import { and, desc, eq, isNotNull, isNull } from "drizzle-orm";
import { alias } from "drizzle-orm/mysql-core";
import type { Brief, SavedBrief } from "#shared/schemas/brief";
import type { Queryable } from "../../db/client";
import { briefs, briefVersions } from "../../db/schema/briefs";
import { users } from "../../db/schema/identity";

const creators = alias(users, "creators");
const editors = alias(users, "editors");

function select(db: Queryable) {
  return db
    .select({
      id: briefs.id,
      name: briefs.name,
      version: briefs.version,
      brief: briefs.brief,
      createdBy: { id: creators.id, name: creators.name },
      updatedBy: { id: editors.id, name: editors.name },
      createdAt: briefs.createdAt,
      updatedAt: briefs.updatedAt,
    })
    .from(briefs)
    .innerJoin(creators, eq(creators.id, briefs.createdBy))
    .innerJoin(editors, eq(editors.id, briefs.updatedBy));
}

type Row = Awaited<ReturnType<typeof select>>[number];

const present = (row: Row): SavedBrief => ({
  ...row,
  createdAt: row.createdAt.toISOString(),
  updatedAt: row.updatedAt.toISOString(),
});

const owned = (teamId: number, id: number) => and(eq(briefs.teamId, teamId), eq(briefs.id, id));

export async function selectBriefs(db: Queryable, teamId: number): Promise<SavedBrief[]> {
  const rows = await select(db)
    .where(and(eq(briefs.teamId, teamId), isNull(briefs.deletedAt)))
    .orderBy(desc(briefs.updatedAt), desc(briefs.id));
  return rows.map(present);
}

export async function selectBrief(
  db: Queryable,
  teamId: number,
  id: number,
): Promise<SavedBrief | undefined> {
  const [row] = await select(db).where(and(owned(teamId, id), isNull(briefs.deletedAt)));
  return row && present(row);
}

/** A brief as one of its versions had it. */
export async function selectVersion(
  db: Queryable,
  teamId: number,
  id: number,
  version: number,
): Promise<{ name: string; brief: Brief } | undefined> {
  const [row] = await db
    .select({ name: briefVersions.name, brief: briefVersions.brief })
    .from(briefVersions)
    .innerJoin(briefs, eq(briefs.id, briefVersions.briefId))
    .where(and(owned(teamId, id), eq(briefVersions.version, version)));
  return row;
}

type Edit = { name: string; brief: Brief; userId: string; now: Date };

/** Writes a new brief with its first version, and returns its id. */
export async function insertBrief(db: Queryable, teamId: number, edit: Edit): Promise<number> {
  const { name, brief, userId, now } = edit;
  const [{ id }] = await db
    .insert(briefs)
    .values({
      teamId,
      name,
      brief,
      version: 1,
      createdBy: userId,
      updatedBy: userId,
      createdAt: now,
      updatedAt: now,
    })
    .$returningId();
  await insertVersion(db, id, 1, edit);
  return id;
}

/** Writes the next version over the one that was edited; false when that is no longer the latest. */
export async function updateBrief(
  db: Queryable,
  teamId: number,
  id: number,
  version: number,
  edit: Edit,
): Promise<boolean> {
  const { name, brief, userId, now } = edit;
  const [{ affectedRows }] = await db
    .update(briefs)
    .set({ name, brief, version: version + 1, updatedBy: userId, updatedAt: now })
    .where(and(owned(teamId, id), eq(briefs.version, version), isNull(briefs.deletedAt)));
  if (affectedRows === 0) return false;
  await insertVersion(db, id, version + 1, edit);
  return true;
}

async function insertVersion(db: Queryable, briefId: number, version: number, edit: Edit): Promise<void> {
  const { name, brief, userId, now } = edit;
  await db.insert(briefVersions).values({ briefId, version, name, brief, savedBy: userId, savedAt: now });
}

/** Hides a brief; false when there is none to hide. */
export async function markDeleted(db: Queryable, teamId: number, id: number, now: Date): Promise<boolean> {
  const [{ affectedRows }] = await db
    .update(briefs)
    .set({ deletedAt: now })
    .where(and(owned(teamId, id), isNull(briefs.deletedAt)));
  return affectedRows > 0;
}

/** Brings a hidden brief back; false when there is none. */
export async function markRestored(db: Queryable, teamId: number, id: number): Promise<boolean> {
  const [{ affectedRows }] = await db
    .update(briefs)
    .set({ deletedAt: null })
    .where(and(owned(teamId, id), isNotNull(briefs.deletedAt)));
  return affectedRows > 0;
}
