import type { Database, Queryable } from "../../db/client";
import type { SignedInContext } from "../../http/context";
import { type CatalogVersion, countChange, selectVersion } from "./queries";

type Kept = { version: number; value: Promise<unknown> };

/** Things kept in memory; the largest, what resistors cost at one quantity, take about a megabyte. */
const MOST_KEPT = 64;

/** What was read, by database and by whose it is and what; one version of each, the least recently used first. */
const kept = new WeakMap<Database, Map<string, Kept>>();

/** The version that each request has seen, so that all it reads is of one. */
const seen = new WeakMap<SignedInContext, Promise<CatalogVersion>>();

/** The version of all that the actor's team can choose from; it changes with every write to it. */
export function catalogVersion(context: SignedInContext): Promise<CatalogVersion> {
  const version = seen.get(context) ?? selectVersion(context.db, context.actor.team.id);
  seen.set(context, version);
  return version;
}

/**
 * Reads something of the catalog, or gives what was read before where nothing has changed since. What it gives is
 * for many requests, so nobody may change it.
 *
 * @param whose the catalog that all teams share, or what is the actor's team's own
 * @param what names what is read, which must depend on nothing else
 * @param read reads it from the database
 */
export async function readKept<T>(
  context: SignedInContext,
  whose: "shared" | "own",
  what: string,
  read: () => Promise<T>,
): Promise<T> {
  const { db, actor } = context;
  const version = (await catalogVersion(context))[whose];
  const ofDatabase = kept.get(db) ?? new Map<string, Kept>();
  kept.set(db, ofDatabase);
  const key = whose === "shared" ? `shared ${what}` : `${actor.team.id} ${what}`;
  const found = ofDatabase.get(key);
  // A query is run again each time it is awaited; only what it gave is worth keeping.
  const entry = found?.version === version ? found : { version, value: Promise.resolve().then(read) };
  ofDatabase.delete(key);
  ofDatabase.set(key, entry);
  if (ofDatabase.size > MOST_KEPT) ofDatabase.delete(ofDatabase.keys().next().value as string);
  // What could not be read is not kept.
  if (entry !== found) entry.value.catch(() => ofDatabase.get(key) === entry && ofDatabase.delete(key));
  return entry.value as Promise<T>;
}

/**
 * Says that parts or orderables have changed, in the transaction that changes them.
 *
 * @param teamId whose own they are; null for the shared catalog
 */
export function catalogChanged(transaction: Queryable, teamId: number | null): Promise<void> {
  return countChange(transaction, teamId);
}
