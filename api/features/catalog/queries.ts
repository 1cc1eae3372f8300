import { asc, inArray, sql } from "drizzle-orm";
import type { Queryable } from "../../db/client";
import { catalogVersions } from "../../db/schema/catalog";

/** Where the catalog that all teams share counts its changes. */
const SHARED = 0;

/** The versions of the shared catalog and of a team's own parts, as one word. */
export async function selectVersion(db: Queryable, teamId: number): Promise<string> {
  const rows = await db
    .select()
    .from(catalogVersions)
    .where(inArray(catalogVersions.teamId, [SHARED, teamId]))
    .orderBy(asc(catalogVersions.teamId));
  return rows.map((row) => `${row.teamId}:${row.version}`).join(" ");
}

/** Counts a change; a team's own, or the shared catalog's where there is no team. */
export async function countChange(db: Queryable, teamId: number | null): Promise<void> {
  await db
    .insert(catalogVersions)
    .values({ teamId: teamId ?? SHARED, version: 1 })
    .onDuplicateKeyUpdate({ set: { version: sql`${catalogVersions.version} + 1` } });
}
