import supertest from "supertest";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { users } from "../../api/db/schema/identity";
import { sessions } from "../../api/db/schema/sessions";
import { readEnvironment } from "../../api/env";
import { refuseDemoSecrets } from "../../api/features/identity/demo";
import { hashPassword } from "../../api/features/identity/password";
import { BASE, PASSWORD, startTestApi, type TestApi, type TestTeam } from "../support/api";

const HOUR = 3_600_000;
let api: TestApi;
let team: TestTeam;

beforeAll(async () => {
  api = await startTestApi();
  team = await api.addTeam("tidewater");
});
afterAll(() => api.stop());
beforeEach(() => {
  // Each test begins a day later, when earlier failures are forgotten.
  api.time.now += 24 * HOUR;
});

const signIn = (email: string, password: string) =>
  supertest(api.app).post(`${BASE}/auth/sign-in`).send({ email, password });

const cookieOf = (response: { headers: Record<string, unknown> }) =>
  String((response.headers["set-cookie"] as string[] | undefined)?.[0] ?? "");

describe("signing in", () => {
  it("sets a cookie that scripts can't read and other sites can't send", async () => {
    const cookie = cookieOf(await signIn("designer@tidewater.example", PASSWORD).expect(204));
    expect(cookie).toMatch(/HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
    expect(cookie).toMatch(/Path=\//);
    // 40 letters and digits of base 32: 200 random bits.
    expect(cookie).toMatch(/^evenswing=[a-z0-9]{40};/);
  });

  it("takes the address in any case", async () => {
    await signIn("Designer@Tidewater.Example", PASSWORD).expect(204);
  });

  it("says the same of a wrong password and of an address without an account", async () => {
    const wrong = await signIn("designer@tidewater.example", "not this").expect(401);
    const unknown = await signIn("nobody@tidewater.example", "not this").expect(401);
    const told = ({ body }: { body: Record<string, unknown> }) => ({ ...body, requestId: null });
    expect(told(unknown)).toEqual(told(wrong));
    expect(wrong.headers["set-cookie"]).toBeUndefined();
  });

  it("gives a new session id each time, never the one the browser came with", async () => {
    const first = cookieOf(await signIn("buyer@tidewater.example", PASSWORD));
    const planted = first.split(";")[0];
    const second = cookieOf(
      await supertest(api.app)
        .post(`${BASE}/auth/sign-in`)
        .set("cookie", planted)
        .send({ email: "buyer@tidewater.example", password: PASSWORD }),
    );
    expect(second.split(";")[0]).not.toBe(planted);
  });

  it("makes whoever keeps failing wait, twice as long each time, at most a minute", async () => {
    const email = "reviewer@tidewater.example";
    for (let failure = 0; failure < 5; failure++) await signIn(email, "wrong").expect(401);
    let expected = 1;
    for (let round = 0; round < 8; round++) {
      const refused = await signIn(email, PASSWORD).expect(429);
      expect(refused.headers["retry-after"]).toBe(String(expected));
      api.time.now += expected * 1000;
      await signIn(email, "wrong").expect(401);
      expected = Math.min(60, expected * 2);
    }
    api.time.now += 60_000;
    await signIn(email, PASSWORD).expect(204);
    // Success forgets the failures.
    await signIn(email, "wrong").expect(401);
    await signIn(email, PASSWORD).expect(204);
  });

  it("slows down an address that tries many accounts", async () => {
    for (let failure = 0; failure < 5; failure++)
      await signIn(`guess${failure}@x.example`, "wrong").expect(401);
    await signIn("guess9@x.example", "wrong").expect(429);
  });

  it("names the fields that are wrong", async () => {
    const { body } = await signIn("no address", "").expect(422);
    expect(body.errors.map(({ path }: { path: string }) => path)).toEqual(["email", "password"]);
  });
});

describe("a session", () => {
  it("says who is signed in, for which team, with which roles", async () => {
    const agent = await api.signIn("designer@tidewater.example");
    const { body } = await agent.get(`${BASE}/auth/me`).expect(200);
    expect(body).toMatchObject({
      user: { email: "designer@tidewater.example" },
      team: { id: team.id, name: "tidewater", roles: ["designer"] },
      teams: [{ id: team.id, name: "tidewater" }],
    });
    expect(JSON.stringify(body)).not.toContain("argon2");
  });

  it("is over once signed out, also for a copy of its cookie", async () => {
    const cookie = cookieOf(await signIn("buyer@tidewater.example", PASSWORD)).split(";")[0];
    const me = () => supertest(api.app).get(`${BASE}/auth/me`).set("cookie", cookie);
    await me().expect(200);
    await supertest(api.app).post(`${BASE}/auth/sign-out`).set("cookie", cookie).expect(204);
    await me().expect(401);
  });

  it("ends at the absolute limit, however busy it was", async () => {
    const cookie = cookieOf(await signIn("buyer@tidewater.example", PASSWORD)).split(";")[0];
    const me = () => supertest(api.app).get(`${BASE}/auth/me`).set("cookie", cookie);
    api.time.now += 167 * HOUR;
    await me().expect(200);
    api.time.now += 2 * HOUR;
    await me().expect(401);
  });

  it("ends when it was idle too long", async () => {
    const cookie = cookieOf(await signIn("buyer@tidewater.example", PASSWORD)).split(";")[0];
    await api.db.update(sessions).set({ expiresAt: new Date(Date.now() - 1000) });
    await supertest(api.app).get(`${BASE}/auth/me`).set("cookie", cookie).expect(401);
  });

  it("moves to another of one's teams under a new id, and to no team one isn't in", async () => {
    const second = await api.addTeam("second");
    const third = await api.addTeam("third");
    await api.addMember(second.id, "designer@tidewater.example", ["viewer"]);
    const agent = await api.signIn("designer@tidewater.example");
    const before = await agent.get(`${BASE}/auth/me`);
    const moved = await agent.post(`${BASE}/auth/team`).send({ teamId: second.id }).expect(204);
    expect(cookieOf(moved)).toMatch(/^evenswing=/);
    const after = await agent.get(`${BASE}/auth/me`).expect(200);
    expect(before.body.team.roles).toEqual(["designer"]);
    expect(after.body.team).toMatchObject({ id: second.id, roles: ["viewer"] });
    await agent.post(`${BASE}/auth/team`).send({ teamId: third.id }).expect(404);
  });
});

describe("outside demo mode", () => {
  it("the server refuses to start while somebody can sign in with the demo password", async () => {
    const row = { name: "Demo", createdAt: new Date() };
    const email = "owner@lantern.example";
    await api.db
      .insert(users)
      .values({ ...row, id: email, email, passwordHash: await hashPassword("evenswing-demo") });
    await expect(refuseDemoSecrets(api.db)).rejects.toThrow(
      /owner@lantern.example can sign in with the demo password/,
    );
    await api.db.update(users).set({ passwordHash: await hashPassword("something else") });
    await expect(refuseDemoSecrets(api.db)).resolves.toBeUndefined();
  });

  it("no demo accounts are told", async () => {
    await supertest(api.app).get(`${BASE}/auth/demo`).expect(404);
  });

  it("a wrong environment is refused by the variable's name", () => {
    expect(() => readEnvironment({})).toThrow(/DATABASE_URL/);
    expect(() => readEnvironment({ DATABASE_URL: "mysql://a:b@127.0.0.1/x", PORT: "port" })).toThrow(/PORT/);
  });
});
