import { randomBytes } from "node:crypto";
import { inject } from "vitest";
import { testDatabaseUrl, withConnection } from "./database-server";

/** A database of one test file's own. */
export type TestDatabase = {
  /** For DATABASE_URL, or `createPool`. */
  url: string;
  drop: () => Promise<void>;
};

/**
 * Makes an empty database with the product's tables, which nobody else uses: test files run side by side.
 *
 * @throws {Error} where no MariaDB was started for the tests
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const { database: template, statements, filledTables } = inject("templateDatabase");
  const name = `evenswing_test_${randomBytes(6).toString("hex")}`;
  await withConnection("", async (connection) => {
    const copies = filledTables.map(
      (table) => `INSERT INTO \`${table}\` SELECT * FROM \`${template}\`.\`${table}\``,
    );
    // Tables come in any order, so their references are checked only from here on.
    const all = [
      `CREATE DATABASE ${name}`,
      `USE ${name}`,
      "SET foreign_key_checks = 0",
      ...statements,
      ...copies,
    ];
    await connection.query(all.join(";\n"));
  });
  return {
    url: testDatabaseUrl(name),
    drop: () =>
      withConnection("", async (connection) => void (await connection.query(`DROP DATABASE ${name}`))),
  };
}
