import { execFile } from "node:child_process";
import { promisify } from "node:util";
import type { Connection, RowDataPacket } from "mysql2/promise";
import type { TestProject } from "vitest/node";
import { testDatabaseUrl, withConnection } from "./database-server";

declare module "vitest" {
  interface ProvidedContext {
    /** What the migrations made, once for all test files: each makes its own tables from these statements. */
    templateDatabase: { database: string; statements: string[]; filledTables: string[] };
  }
}

/** Migrates one database, as the product does, for all test files to copy. */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  const database = `evenswing_test_template_${process.pid}`;
  await withConnection("", (connection) =>
    connection.query(`CREATE DATABASE ${database} CHARACTER SET utf8mb4`),
  );
  await promisify(execFile)(process.execPath, ["--import", "tsx", "api/db/migrate.ts"], {
    cwd: project.config.root,
    env: { ...process.env, DATABASE_URL: testDatabaseUrl(database) },
  });
  const made = await withConnection(database, readTables);
  project.provide("templateDatabase", { database, ...made });
  return () =>
    withConnection("", async (connection) => void (await connection.query(`DROP DATABASE ${database}`)));
}

async function readTables(connection: Connection) {
  const [tables] = await connection.query<RowDataPacket[]>("SHOW FULL TABLES");
  const [triggers] = await connection.query<RowDataPacket[]>("SHOW TRIGGERS");
  const statements: string[] = [];
  const filledTables: string[] = [];
  for (const row of tables) {
    const [name, kind] = Object.values(row) as [string, string];
    if (kind !== "BASE TABLE" || triggers.length > 0) {
      throw new Error(
        `The test databases are copies of tables only; the migrations also made ${name} (${kind}).`,
      );
    }
    const [[created]] = await connection.query<RowDataPacket[]>(`SHOW CREATE TABLE \`${name}\``);
    statements.push(created["Create Table"]);
    const [filled] = await connection.query<RowDataPacket[]>(`SELECT 1 FROM \`${name}\` LIMIT 1`);
    if (filled.length > 0) filledTables.push(name);
  }
  return { statements, filledTables };
}
