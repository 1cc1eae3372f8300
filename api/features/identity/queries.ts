import { and, asc, eq, min } from "drizzle-orm";
import type { Queryable } from "../../db/client";
import { users } from "../../db/schema/identity";
import { memberships, teams } from "../../db/schema/teams";

export async function selectUserByEmail(db: Queryable, email: string) {
  const [found] = await db.select().from(users).where(eq(users.email, email));
  return found;
}

/** The teams a person belongs to, by name. */
export function selectTeamsOf(db: Queryable, userId: string): Promise<{ id: number; name: string }[]> {
  return db
    .select({ id: teams.id, name: teams.name })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(teams.name), asc(teams.id));
}

/** The team a person joined first; null for one who belongs to none. */
export async function selectFirstTeam(db: Queryable, userId: string): Promise<number | null> {
  const [found] = await db
    .select({ id: min(memberships.teamId) })
    .from(memberships)
    .where(eq(memberships.userId, userId));
  return found?.id ?? null;
}

export async function isMember(db: Queryable, userId: string, teamId: number): Promise<boolean> {
  const found = await db
    .select({ teamId: memberships.teamId })
    .from(memberships)
    .where(and(eq(memberships.userId, userId), eq(memberships.teamId, teamId)));
  return found.length > 0;
}
