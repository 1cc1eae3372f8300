import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "#shared/demo";
import type { DemoAccounts, Me, SignIn, SwitchTeam } from "#shared/schemas/identity";
import type { Context, SignedInContext } from "../../http/context";
import { notFound, tooMany, unauthorised } from "../../http/problem";
import { checkPassword } from "./password";
import { isMember, selectFirstTeam, selectTeamsOf, selectUserByEmail } from "./queries";

/**
 * Signs a person in, for the team they joined first.
 *
 * @param cookieHeader what the browser came with: the session in it ends, as the new one takes its place
 * @returns the session cookie
 * @throws the same problem for a wrong password and for an address without an account
 */
export async function signIn(
  context: Context,
  { email, password }: SignIn,
  cookieHeader: string,
): Promise<string> {
  const { db, clock, sessions, signInBackoff, log } = context;
  const address = email.trim().toLowerCase();
  const keys = [`account ${address}`, `address ${context.address}`];
  refuseWhileWaiting(context, keys);
  const user = await selectUserByEmail(db, address);
  const matches = await checkPassword(user?.passwordHash, password);
  const teamId = user && matches ? await selectFirstTeam(db, user.id) : null;
  // Guesses sent at once all passed the first look; no more of them may learn something than sent one by one.
  refuseWhileWaiting(context, keys);
  if (!user || teamId === null) {
    for (const key of keys) signInBackoff.fail(key, clock().getTime());
    log.warn({ address: context.address, requestId: context.requestId }, "sign-in refused");
    throw unauthorised("wrong_credentials", "The e-mail address or the password is wrong.");
  }
  for (const key of keys) signInBackoff.succeed(key);
  log.info({ user: user.id, requestId: context.requestId }, "signed in");
  await sessions.endCarried(cookieHeader);
  return sessions.start(user.id, { teamId, signedInAt: clock() });
}

function refuseWhileWaiting({ clock, signInBackoff }: Context, keys: readonly string[]): void {
  const now = clock().getTime();
  const wait = Math.max(...keys.map((key) => signInBackoff.waitFor(key, now)));
  if (wait === 0) return;
  const seconds = Math.ceil(wait / 1000);
  throw tooMany(`Too many tries. Wait ${seconds} s and try again.`, seconds);
}

/** Ends the session and returns a cookie that clears the browser's. */
export function signOut({ sessions, actor }: SignedInContext): Promise<string> {
  return sessions.end(actor.sessionId);
}

export async function describeMe({ db, actor }: SignedInContext): Promise<Me> {
  return {
    user: actor.user,
    team: { ...actor.team, roles: actor.roles },
    teams: await selectTeamsOf(db, actor.user.id),
  };
}

/**
 * Moves to another of one's teams, under a new session id, as rights change with the team.
 *
 * @returns the session cookie
 */
export async function switchTeam(
  { db, sessions, actor }: SignedInContext,
  { teamId }: SwitchTeam,
): Promise<string> {
  if (!(await isMember(db, actor.user.id, teamId))) throw notFound("This team");
  const signedInAt = await sessions.signedInAt(actor.sessionId);
  await sessions.end(actor.sessionId);
  return sessions.start(actor.user.id, { teamId, signedInAt });
}

/** Who can sign in to the demo, and how. */
export function demoAccounts({ environment }: Context): DemoAccounts {
  if (!environment.demo) throw notFound("A demo");
  return { password: DEMO_PASSWORD, accounts: [...DEMO_ACCOUNTS] };
}
