import { inArray, sql } from "drizzle-orm";
import type { Queryable } from "../../db/client";
import { catalogVersions } from "../../db/schema/catalog";

/** Where the catalog that all teams share counts its changes. */
const SHARED = 0;

/** How often the shared catalog and a team's own part of it have changed. */
export type CatalogVersion = { shared: number; own: number };

export async function selectVersion(db: Queryable, teamId: number): Promise<CatalogVersion> {
  const rows = await db
    .select()
    .from(catalogVersions)
    .where(inArray(catalogVersions.teamId, [SHARED, teamId]));
  const versionOf = (id: number) => rows.find((row) => row.teamId === id)?.version ?? 0;
  return { shared: versionOf(SHARED), own: versionOf(teamId) };
}

/** Counts a change; a team's own, or the shared catalog's where there is no team. */
export async function countChange(db: Queryable, teamId: number | null): Promise<void> {
  await db
    .insert(catalogVersions)
    .values({ teamId: teamId ?? SHARED, version: 1 })
    .onDuplicateKeyUpdate({ set: { version: sql`${catalogVersions.version} + 1` } });
}
