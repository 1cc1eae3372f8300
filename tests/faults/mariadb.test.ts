import { spawn } from "node:child_process";
import { existsSync, mkdirSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import mysql from "mysql2/promise";
import { expect, onTestFinished, test } from "vitest";
import { greets, startMariadb } from "../../scripts/lib/mariadb.mjs";
import { anyFreePort } from "../../scripts/lib/ports.mjs";
import { runs } from "../../scripts/lib/proc.mjs";
import { findProgram } from "../../scripts/lib/programs.mjs";
import { temporaryFolder, until } from "./snippet";

const account = { user: "tester", password: "an-invented-password", databases: "own\\_%" };

const asRoot = process.getuid?.() === 0 ? ["--user=root"] : [];

type Options = { statements?: string[]; port?: number; careless?: boolean };

async function start(folder: string, { careless = true, ...options }: Options = {}) {
  const port = options.port ?? (await anyFreePort());
  const server = await startMariadb({ folder, port, account, careless, statements: options.statements });
  onTestFinished(server.stop);
  return { port, server };
}

function connect(port: number, user: string, password: string, database?: string) {
  return mysql.createConnection({ host: "127.0.0.1", port, user, password, database });
}

test("starts on a folder that a killed run left half-made and a forgotten server holds", async () => {
  const folder = join(temporaryFolder(), "data");
  mkdirSync(`${folder}.unfinished`);
  writeFileSync(join(`${folder}.unfinished`, "half"), "");
  const first = await start(folder, { careless: false, statements: ["CREATE DATABASE own_one;"] });
  const kept = await connect(first.port, account.user, account.password, "own_one");
  await kept.query("CREATE TABLE kept (n INT)");
  await kept.query("INSERT INTO kept VALUES (42)");
  await kept.end();
  process.kill(first.server.pid, "SIGKILL");
  await first.server.exited;

  const forgottenPort = await anyFreePort();
  const forgotten = spawn(
    findProgram("mariadbd") as string,
    ["--no-defaults", ...asRoot, `--datadir=${folder}`, `--port=${forgottenPort}`, "--socket=server.sock"],
    { stdio: "ignore" },
  );
  onTestFinished(() => void forgotten.kill("SIGKILL"));
  await until(() => greets("127.0.0.1", forgottenPort));

  const second = await start(folder);
  expect(runs(forgotten.pid as number)).toBe(false);
  const again = await connect(second.port, account.user, account.password, "own_one");
  expect((await again.query("SELECT n FROM kept"))[0]).toEqual([{ n: 42 }]);
  await again.end();
});

test("only its own account can sign in, and reaches only its own databases", async () => {
  const folder = join(temporaryFolder(), "data");
  const { port } = await start(folder);
  for (const user of ["root", "mysql", ""]) {
    await expect(connect(port, user, "")).rejects.toMatchObject({
      code: expect.stringMatching(/ACCESS_DENIED/),
    });
  }
  await expect(connect(port, account.user, "another")).rejects.toMatchObject({
    code: "ER_ACCESS_DENIED_ERROR",
  });
  const connection = await connect(port, account.user, account.password);
  await connection.query("CREATE DATABASE own_two");
  await expect(connection.query("CREATE DATABASE foreign_one")).rejects.toMatchObject({
    code: "ER_DBACCESS_DENIED_ERROR",
  });
  await expect(connection.query("SELECT * FROM mysql.global_priv")).rejects.toMatchObject({
    code: "ER_TABLEACCESS_DENIED_ERROR",
  });
  await connection.end();
  expect(statSync(folder).mode & 0o077).toBe(0);
  expect(statSync(join(folder, "set-up.sql")).mode & 0o077).toBe(0);
});

test("says what MariaDB's log says when it can't start", async () => {
  const folder = join(temporaryFolder(), "data");
  const { port } = await start(folder);
  const other = join(temporaryFolder(), "data");
  await expect(start(other, { port })).rejects.toThrow(
    /MariaDB ended instead of starting[\s\S]*Address already in use/,
  );
});

test("does not throw away a data folder that it can't read", async () => {
  const folder = join(temporaryFolder(), "data");
  mkdirSync(join(folder, "evenswing"), { recursive: true });
  await expect(start(folder)).rejects.toThrow("is damaged: its system tables are gone");
  expect(existsSync(join(folder, "evenswing"))).toBe(true);
});
