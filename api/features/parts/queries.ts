import { and, asc, eq, getTableColumns, gt, isNull, like, or, type SQL } from "drizzle-orm";
import type { ListPartsQuery, Part } from "#shared/schemas/part";
import type { Queryable } from "../../db/client";
import { parts } from "../../db/schema/parts";

const { teamId: _team, ...columns } = getTableColumns(parts);

/** What a team may see: the shared catalog and its own parts. */
function visibleTo(teamId: number): SQL | undefined {
  return or(isNull(parts.teamId), eq(parts.teamId, teamId));
}

/** Backslash, percent and underscore stand for themselves in what a person types. */
function containing(text: string): string {
  return `%${text.replace(/[\\%_]/g, "\\$&")}%`;
}

export type PartCursor = { partNumber: string; id: number };

/** Parts in part-number order after a cursor, one more than asked for, so that the caller knows whether there are more. */
export function selectParts(
  db: Queryable,
  teamId: number,
  { polarity, package: outline, q, limit }: ListPartsQuery,
  after: PartCursor | null,
): Promise<Part[]> {
  return db
    .select(columns)
    .from(parts)
    .where(
      and(
        visibleTo(teamId),
        polarity && eq(parts.polarity, polarity),
        outline ? eq(parts.package, outline) : undefined,
        q ? or(like(parts.partNumber, containing(q)), like(parts.maker, containing(q))) : undefined,
        after
          ? or(
              gt(parts.partNumber, after.partNumber),
              and(eq(parts.partNumber, after.partNumber), gt(parts.id, after.id)),
            )
          : undefined,
      ),
    )
    .orderBy(asc(parts.partNumber), asc(parts.id))
    .limit(limit + 1);
}

export async function selectPart(db: Queryable, teamId: number, id: number): Promise<Part | undefined> {
  const [found] = await db
    .select(columns)
    .from(parts)
    .where(and(visibleTo(teamId), eq(parts.id, id)));
  return found;
}

/** Every part a team may use. */
export function selectAllParts(db: Queryable, teamId: number): Promise<Part[]> {
  return db.select(columns).from(parts).where(visibleTo(teamId));
}

/** Every part of the catalog that all teams share. */
export function selectSharedParts(db: Queryable): Promise<Part[]> {
  return db.select(columns).from(parts).where(isNull(parts.teamId));
}

/** Every part that is a team's own. */
export function selectOwnParts(db: Queryable, teamId: number): Promise<Part[]> {
  return db.select(columns).from(parts).where(eq(parts.teamId, teamId));
}
