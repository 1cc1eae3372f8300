import type { Database, Queryable } from "../../db/client";
import type { SignedInContext } from "../../http/context";
import { countChange, selectVersion } from "./queries";

type Kept = { version: string; value: Promise<unknown> };

/** What was read, by database, team and kind; one version of each. */
const kept = new WeakMap<Database, Map<string, Kept>>();

/** The version of all that the actor's team can choose from; it changes with every write to it. */
export function catalogVersion({ db, actor }: SignedInContext): Promise<string> {
  return selectVersion(db, actor.team.id);
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
