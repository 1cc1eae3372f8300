import { DrizzleMySQLAdapter } from "@lucia-auth/adapter-drizzle";
import { and, eq } from "drizzle-orm";
import { Lucia, TimeSpan } from "lucia";
import type { Role } from "#shared/permissions";
import type { Database } from "../db/client";
import { users } from "../db/schema/identity";
import { sessions } from "../db/schema/sessions";
import { membershipRoles, teams } from "../db/schema/teams";
import type { Environment } from "../env";

/** Who asks, for which team. The team comes from the session, never from the request. */
export type Actor = {
  sessionId: string;
  user: { id: string; email: string; name: string };
  team: { id: number; name: string };
  roles: Role[];
};

type SessionAttributes = { teamId: number; signedInAt: Date };

declare module "lucia" {
  interface Register {
    Lucia: ReturnType<typeof createLucia>;
    DatabaseSessionAttributes: SessionAttributes;
    DatabaseUserAttributes: { email: string; name: string };
  }
}

function createLucia(db: Database, environment: Environment) {
  const secure = environment.publicOrigin?.startsWith("https://") ?? false;
  return new Lucia(new DrizzleMySQLAdapter(db, sessions, users), {
    sessionExpiresIn: new TimeSpan(environment.sessionIdleMs, "ms"),
    sessionCookie: {
      // The prefix makes browsers insist on Secure and on no other host having set it.
      name: secure ? "__Host-evenswing" : "evenswing",
      attributes: { secure, sameSite: "lax", path: "/" },
    },
    getSessionAttributes: ({ teamId, signedInAt }) => ({ teamId, signedInAt }),
    getUserAttributes: ({ email, name }) => ({ email, name }),
  });
}

export type Sessions = ReturnType<typeof createSessions>;

/** Sessions in MariaDB: idle and absolute time-outs are kept here, whatever a cookie says. */
export function createSessions(db: Database, environment: Environment, clock: () => Date) {
  const lucia = createLucia(db, environment);
  return {
    /**
     * Finds out who sent a request.
     *
     * @returns the actor, and a cookie to set when the idle time was put off; null for nobody
     */
    async identify(cookieHeader: string): Promise<{ actor: Actor; cookie: string | null } | null> {
      const sessionId = lucia.readSessionCookie(cookieHeader);
      if (!sessionId) return null;
      const { session, user } = await lucia.validateSession(sessionId);
      if (!session) return null;
      if (clock().getTime() - session.signedInAt.getTime() > environment.sessionAbsoluteMs) {
        await lucia.invalidateSession(session.id);
        return null;
      }
      // Read at every request, so that a removed member or a changed role counts at once.
      const rows = await db
        .select({ name: teams.name, role: membershipRoles.role })
        .from(membershipRoles)
        .innerJoin(teams, eq(teams.id, membershipRoles.teamId))
        .where(and(eq(membershipRoles.teamId, session.teamId), eq(membershipRoles.userId, user.id)));
      if (rows.length === 0) return null;
      return {
        actor: {
          sessionId: session.id,
          user: { id: user.id, email: user.email, name: user.name },
          team: { id: session.teamId, name: rows[0].name },
          roles: rows.map(({ role }) => role),
        },
        cookie: session.fresh ? lucia.createSessionCookie(session.id).serialize() : null,
      };
    },

    /** Starts a session under a new id, and returns the cookie that carries it. */
    async start(userId: string, attributes: SessionAttributes): Promise<string> {
      const session = await lucia.createSession(userId, attributes);
      return lucia.createSessionCookie(session.id).serialize();
    },

    /** When a session began: a new id for the same sign-in keeps the absolute time-out. */
    async signedInAt(sessionId: string): Promise<Date> {
      const { session } = await lucia.validateSession(sessionId);
      return session?.signedInAt ?? clock();
    },

    /** Ends the session that a request came with, if any. */
    async endCarried(cookieHeader: string): Promise<void> {
      const sessionId = lucia.readSessionCookie(cookieHeader);
      if (sessionId) await lucia.invalidateSession(sessionId);
    },

    /** Ends a session and returns a cookie that clears the browser's. */
    async end(sessionId: string): Promise<string> {
      await lucia.invalidateSession(sessionId);
      return lucia.createBlankSessionCookie().serialize();
    },
  };
}
