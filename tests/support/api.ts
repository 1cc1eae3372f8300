import pino from "pino";
import supertest from "supertest";
import { ROLES, type Role } from "#shared/permissions";
import type { Part } from "#shared/schemas/part";
import { createApp } from "../../api/app";
import { openDatabase } from "../../api/db/client";
import { users } from "../../api/db/schema/identity";
import { parts } from "../../api/db/schema/parts";
import { membershipRoles, memberships, teams } from "../../api/db/schema/teams";
import { readEnvironment } from "../../api/env";
import { hashPassword } from "../../api/features/identity/password";
import { Backoff } from "../../api/http/backoff";
import type { Surroundings } from "../../api/http/context";
import { createSessions } from "../../api/http/session";
import { buildPart } from "./build-part";
import { createTestDatabase } from "./database";

export const PASSWORD = "a long enough password";
export const BASE = "/api/v1";

const passwordHash = hashPassword(PASSWORD);

export type Agent = ReturnType<typeof supertest.agent>;
export type TestTeam = { id: number; name: string; as: Record<Role, Agent> };

/** The API on a database of its own, with two teams of one member a role, a small catalog, and a clock to turn. */
export async function startTestApi() {
  const database = await createTestDatabase();
  const { db, close } = openDatabase(database.url);
  const environment = readEnvironment({ DATABASE_URL: database.url, NODE_ENV: "test", LOG_LEVEL: "silent" });
  const time = { now: Date.now() };
  const clock = () => new Date(time.now);
  const logged: { level: number; msg?: string }[] = [];
  const surroundings: Surroundings = {
    db,
    environment,
    clock,
    sessions: createSessions(db, environment, clock),
    signInBackoff: new Backoff(),
    log: pino({ level: "warn" }, { write: (line: string) => logged.push(JSON.parse(line)) }),
  };
  const app = createApp(surroundings);

  const signIn = async (email: string) => {
    const agent = supertest.agent(app);
    await agent.post(`${BASE}/auth/sign-in`).send({ email, password: PASSWORD }).expect(204);
    return agent;
  };

  const addMember = async (teamId: number, email: string, roles: readonly Role[]) => {
    const createdAt = clock();
    const row = {
      id: email,
      email,
      name: `The ${roles.join(" and ")}`,
      passwordHash: await passwordHash,
      createdAt,
    };
    await db.insert(users).ignore().values(row);
    await db.insert(memberships).values({ teamId, userId: email, createdAt });
    for (const role of roles) await db.insert(membershipRoles).values({ teamId, userId: email, role });
  };

  const addTeam = async (name: string): Promise<TestTeam> => {
    const [{ id }] = await db.insert(teams).values({ name, createdAt: clock() }).$returningId();
    const as: Partial<Record<Role, Agent>> = {};
    for (const role of ROLES) {
      const email = `${role}@${name}.example`;
      await addMember(id, email, [role]);
      as[role] = await signIn(email);
    }
    return { id, name, as: as as Record<Role, Agent> };
  };

  /** Puts a part into the catalog, or with a team's id into that team's own. */
  const addPart = async (overrides: Partial<Part> = {}, teamId: number | null = null): Promise<Part> => {
    const { id: _id, ...part } = buildPart(overrides);
    const [{ id }] = await db
      .insert(parts)
      .values({ ...part, teamId })
      .$returningId();
    return { ...part, id };
  };

  return {
    app,
    db,
    time,
    logged,
    surroundings,
    signIn,
    addMember,
    addTeam,
    addPart,
    stop: async () => {
      await close();
      await database.drop();
    },
  };
}

export type TestApi = Awaited<ReturnType<typeof startTestApi>>;

/** A small brief that the catalog's usual test part fits. */
export const SMALL_BRIEF = {
  rail: { volts: 12 },
  load: { ohms: 10_000 },
  swing: { peak: 1 },
  resistors: {
    divider: { series: "E12", min: 100_000, max: 1_000_000 },
    drain: { series: "E12", min: 1000, max: 10_000 },
    source: { series: "E12", min: 100, max: 1000 },
  },
};

export const SMALL_RESISTORS = { r1: 680_000, r2: 180_000, rd: 2700, rs: 470 };
