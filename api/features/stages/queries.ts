import { and, desc, eq, isNotNull, isNull } from "drizzle-orm";
import { alias } from "drizzle-orm/mysql-core";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import { type Resistors, resistorsSchema } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import type { Stage } from "#shared/schemas/stage";
import type { Queryable } from "../../db/client";
import { users } from "../../db/schema/identity";
import { stages } from "../../db/schema/stages";

const creators = alias(users, "creators");
const editors = alias(users, "editors");

function select(db: Queryable) {
  return db
    .select({
      id: stages.id,
      name: stages.name,
      note: stages.note,
      version: stages.version,
      part: stages.part,
      resistors: stages.resistors,
      brief: stages.brief,
      briefId: stages.briefId,
      briefName: stages.briefName,
      briefVersion: stages.briefVersion,
      createdBy: { id: creators.id, name: creators.name },
      updatedBy: { id: editors.id, name: editors.name },
      createdAt: stages.createdAt,
      updatedAt: stages.updatedAt,
    })
    .from(stages)
    .innerJoin(creators, eq(creators.id, stages.createdBy))
    .innerJoin(editors, eq(editors.id, stages.updatedBy));
}

type Row = Awaited<ReturnType<typeof select>>[number];

function present({ briefId, briefName, briefVersion, ...row }: Row): Stage {
  return {
    ...row,
    // Stages kept before a field came to be take its default.
    brief: briefSchema.parse(row.brief),
    resistors: resistorsSchema.parse(row.resistors),
    origin: briefId && briefName && briefVersion ? { briefId, briefName, briefVersion } : null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}

const owned = (teamId: number, id: number) => and(eq(stages.teamId, teamId), eq(stages.id, id));

export async function selectStages(db: Queryable, teamId: number): Promise<Stage[]> {
  const rows = await select(db)
    .where(and(eq(stages.teamId, teamId), isNull(stages.deletedAt)))
    .orderBy(desc(stages.updatedAt), desc(stages.id));
  return rows.map(present);
}

export async function selectStage(db: Queryable, teamId: number, id: number): Promise<Stage | undefined> {
  const [row] = await select(db).where(and(owned(teamId, id), isNull(stages.deletedAt)));
  return row && present(row);
}

/** What a kept stage freezes. */
export type NewStage = {
  name: string;
  note: string;
  part: Part;
  resistors: Resistors;
  brief: Brief;
  origin: Stage["origin"];
};

export async function insertStage(
  db: Queryable,
  teamId: number,
  { origin, ...stage }: NewStage,
  userId: string,
  now: Date,
): Promise<number> {
  const [{ id }] = await db
    .insert(stages)
    .values({
      ...stage,
      teamId,
      version: 1,
      briefId: origin?.briefId,
      briefName: origin?.briefName,
      briefVersion: origin?.briefVersion,
      createdBy: userId,
      updatedBy: userId,
      createdAt: now,
      updatedAt: now,
    })
    .$returningId();
  return id;
}

/** Writes name, note and values over the version that was edited; false when that is no longer the latest. */
export async function updateStage(
  db: Queryable,
  teamId: number,
  id: number,
  version: number,
  change: { name: string; note: string; resistors: Resistors; userId: string; now: Date },
): Promise<boolean> {
  const { userId, now, ...columns } = change;
  const [{ affectedRows }] = await db
    .update(stages)
    .set({ ...columns, version: version + 1, updatedBy: userId, updatedAt: now })
    .where(and(owned(teamId, id), eq(stages.version, version), isNull(stages.deletedAt)));
  return affectedRows > 0;
}

/** Hides a stage; false when there is none to hide. */
export async function markDeleted(db: Queryable, teamId: number, id: number, now: Date): Promise<boolean> {
  const [{ affectedRows }] = await db
    .update(stages)
    .set({ deletedAt: now })
    .where(and(owned(teamId, id), isNull(stages.deletedAt)));
  return affectedRows > 0;
}

/** Brings a hidden stage back; false when there is none. */
export async function markRestored(db: Queryable, teamId: number, id: number): Promise<boolean> {
  const [{ affectedRows }] = await db
    .update(stages)
    .set({ deletedAt: null })
    .where(and(owned(teamId, id), isNotNull(stages.deletedAt)));
  return affectedRows > 0;
}
