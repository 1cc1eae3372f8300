import { pathToFileURL } from "node:url";
import { sql } from "drizzle-orm";
import type { MySqlTable } from "drizzle-orm/mysql-core";
import { type Database, openDatabase } from "../api/db/client";
import { capacitorOrderables, resistorOrderables } from "../api/db/schema/orderables";
import { parts } from "../api/db/schema/parts";
import { readEnvironment } from "../api/env";
import { catalogChanged } from "../api/features/catalog/service";
import { closePool } from "../api/ranking/pool";
import { readCapacitors, readMosfets, readResistors } from "./catalog/read";
import { loadDemo } from "./demo/load-demo";

const ROWS_A_STATEMENT = 500;

/**
 * Fills a migrated database: the catalog, and in demo mode the demo story. What is there already stays as it is, so
 * that it can be run again.
 */
export async function loadSeeds(db: Database, { demo }: { demo: boolean }): Promise<void> {
  await fillWhenEmpty(db, parts, readMosfets());
  await fillWhenEmpty(db, resistorOrderables, readResistors());
  await fillWhenEmpty(db, capacitorOrderables, readCapacitors());
  if (demo) await loadDemo(db);
}

async function fillWhenEmpty<T extends MySqlTable>(
  db: Database,
  table: T,
  rows: T["$inferInsert"][],
): Promise<void> {
  await db.transaction(async (transaction) => {
    const [{ count }] = await transaction.select({ count: sql<number>`count(*)` }).from(table as MySqlTable);
    if (count > 0) return;
    for (let at = 0; at < rows.length; at += ROWS_A_STATEMENT) {
      await transaction.insert(table).values(rows.slice(at, at + ROWS_A_STATEMENT));
    }
    await catalogChanged(transaction, null);
  });
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? "").href) {
  const environment = readEnvironment();
  const { db, close } = openDatabase(environment.databaseUrl);
  try {
    await loadSeeds(db, { demo: environment.demo });
  } finally {
    await closePool();
    await close();
  }
}
