import { and, eq } from "drizzle-orm";
import supertest from "supertest";
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { membershipRoles, memberships } from "../../api/db/schema/teams";
import { BASE, PASSWORD, startTestApi, type TestApi, type TestTeam } from "../support/api";

const HOUR = 3_600_000;
let api: TestApi;
let team: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
});
afterAll(() => api.stop());

// The session store reads the process's own clock, so that one is turned together with the server's.
beforeEach(() => {
  vi.useFakeTimers({ toFake: ["Date"], now: api.time.now });
  pass(24 * HOUR);
});
afterEach(() => {
  vi.useRealTimers();
});

function pass(milliseconds: number) {
  api.time.now += milliseconds;
  vi.setSystemTime(api.time.now);
}

const signIn = (email: string, password = PASSWORD, cookie = "") =>
  supertest(api.app).post(`${BASE}/auth/sign-in`).set("cookie", cookie).send({ email, password });

const cookieOf = (response: { headers: Record<string, unknown> }) =>
  String((response.headers["set-cookie"] as string[])[0]).split(";")[0];

const me = (cookie: string) => supertest(api.app).get(`${BASE}/auth/me`).set("cookie", cookie);

async function cookieFor(email: string) {
  return cookieOf(await signIn(email).expect(204));
}

describe("a session's cookie", () => {
  it("is dead once its owner moved to another team", async () => {
    const { id: teamId } = await api.addTeam("second");
    await api.addMember(teamId, "designer@tidewater.example", ["viewer"]);
    const before = await cookieFor("designer@tidewater.example");
    const moved = await supertest(api.app)
      .post(`${BASE}/auth/team`)
      .set("cookie", before)
      .send({ teamId })
      .expect(204);
    expect(cookieOf(moved)).not.toBe(before);
    await me(before).expect(401);
    expect((await me(cookieOf(moved)).expect(200)).body.team.id).toBe(teamId);
  });

  it("is dead once the same browser signed in again", async () => {
    const before = await cookieFor("buyer@tidewater.example");
    const after = cookieOf(await signIn("buyer@tidewater.example", PASSWORD, before).expect(204));
    await me(before).expect(401);
    await me(after).expect(200);
  });

  it("outlives a failed sign-in, which proves nothing about who is there", async () => {
    const cookie = await cookieFor("buyer@tidewater.example");
    await signIn("buyer@tidewater.example", "not this", cookie).expect(401);
    await me(cookie).expect(200);
  });

  it.each(["evenswing=", "evenswing=' OR 1=1 -- ", `evenswing=${"a".repeat(40)}`, "evenswing=%00"])(
    "that was made up (%s) signs nobody in",
    async (cookie) => {
      await me(cookie).expect(401);
    },
  );
});

describe("a session in time", () => {
  it("ends after twelve idle hours, and use puts that off", async () => {
    const cookie = await cookieFor("viewer@tidewater.example");
    pass(11 * HOUR);
    await me(cookie).expect(200);
    pass(11 * HOUR);
    await me(cookie).expect(200);
    pass(12 * HOUR + 1000);
    await me(cookie).expect(401);
  });

  it("ends seven days after signing in, however much it was used", async () => {
    const cookie = await cookieFor("viewer@tidewater.example");
    for (let hours = 8; hours <= 168; hours += 8) {
      pass(8 * HOUR);
      await me(cookie).expect(200);
    }
    pass(1000);
    await me(cookie).expect(401);
    pass(-HOUR);
    await me(cookie).expect(401);
  });

  it("keeps its absolute end when it moves to another team", async () => {
    const { id: teamId } = await api.addTeam("third");
    await api.addMember(teamId, "viewer@tidewater.example", ["viewer"]);
    let cookie = await cookieFor("viewer@tidewater.example");
    for (let hours = 8; hours <= 160; hours += 8) {
      pass(8 * HOUR);
      await me(cookie).expect(200);
    }
    const move = supertest(api.app).post(`${BASE}/auth/team`).set("cookie", cookie).send({ teamId });
    cookie = cookieOf(await move.expect(204));
    pass(7 * HOUR);
    await me(cookie).expect(200);
    pass(HOUR + 1000);
    await me(cookie).expect(401);
  });
});

describe("a change to a membership", () => {
  it("counts from the next request on", async () => {
    await api.addMember(team.id, "mover@tidewater.example", ["designer"]);
    const cookie = await cookieFor("mover@tidewater.example");
    const keep = () =>
      supertest(api.app)
        .post(`${BASE}/briefs`)
        .set("cookie", cookie)
        .send({ name: "A", brief: { rail: { volts: 9 } } });
    await keep().expect(201);
    const mine = eq(membershipRoles.userId, "mover@tidewater.example");
    await api.db.update(membershipRoles).set({ role: "viewer" }).where(mine);
    await keep().expect(403);
    await api.db
      .delete(memberships)
      .where(and(eq(memberships.teamId, team.id), eq(memberships.userId, "mover@tidewater.example")));
    await me(cookie).expect(401);
    // Someone without a team is told the same as someone with a wrong password.
    expect((await signIn("mover@tidewater.example").expect(401)).body.code).toBe("wrong_credentials");
  });
});

describe("guesses sent all at once", () => {
  it("learn no more than guesses sent one after the other", async () => {
    const guesses = Array.from({ length: 20 }, () => signIn("librarian@tidewater.example", "not this"));
    const statuses = (await Promise.all(guesses)).map(({ status }) => status);
    expect(statuses.filter((status) => status === 401)).toHaveLength(5);
    expect(statuses.filter((status) => status === 429)).toHaveLength(15);
  });

  it("don't stand in the way of many people signing in at once", async () => {
    const emails = Object.keys(team.as).map((role) => `${role}@tidewater.example`);
    const answers = await Promise.all([...emails, ...emails].map((email) => signIn(email)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([204]));
  });
});
