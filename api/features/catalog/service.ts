import type { Database, Queryable } from "../../db/client";
import type { SignedInContext } from "../../http/context";
import { countChange, selectVersion } from "./queries";

type Kept = { version: string; value: Promise<unknown> };

const MOST_KINDS = 200;

/** What was read, by database, team and kind; one version of each. */
const kept = new WeakMap<Database, Map<string, Kept>>();

/** The version that each request has seen, so that all it reads is of one. */
const seen = new WeakMap<SignedInContext, Promise<string>>();

/** The version of all that the actor's team can choose from; it changes with every write to it. */
export function catalogVersion(context: SignedInContext): Promise<string> {
  const version = seen.get(context) ?? selectVersion(context.db, context.actor.team.id);
  seen.set(context, version);
  return version;
}

/**
 * Reads something of the catalog, or gives what was read before where nothing has changed since.
 *
 * @param kind what is read; each kind is always read the same way
 * @param read reads it from the database
 */
export async function readKept<T>(
  context: SignedInContext,
  kind: string,
  read: () => Promise<T>,
): Promise<T> {
  const { db, actor } = context;
  const version = await catalogVersion(context);
  const ofDatabase = kept.get(db) ?? new Map<string, Kept>();
  kept.set(db, ofDatabase);
  const key = `${actor.team.id} ${kind}`;
  const found = ofDatabase.get(key);
  if (found?.version === version) return found.value as Promise<T>;
  const value = read();
  if (ofDatabase.size >= MOST_KINDS) ofDatabase.delete(ofDatabase.keys().next().value as string);
  ofDatabase.set(key, { version, value });
  // What could not be read is not kept.
  value.catch(() => ofDatabase.delete(key));
  return value;
}

/**
 * Says that parts or orderables have changed, in the transaction that changes them.
 *
 * @param teamId whose own they are; null for the shared catalog
 */
export function catalogChanged(transaction: Queryable, teamId: number | null): Promise<void> {
  return countChange(transaction, teamId);
}
