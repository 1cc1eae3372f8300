import { spawn } from "node:child_process";
import { existsSync, mkdirSync } from "node:fs";
import { join } from "node:path";
import { expect, onTestFinished, test } from "vitest";
import { askHolder, takeLock } from "../../scripts/lib/lock.mjs";
import { takeFolder } from "../../scripts/lib/one-at-a-time.mjs";
import { runs } from "../../scripts/lib/proc.mjs";
import { clearKilledRuns } from "../../scripts/lib/test-folder.mjs";
import { runSnippet, temporaryFolder, until } from "./snippet";

function holdInAnotherProcess(folder: string) {
  return runSnippet(`
    const { takeFolder } = await lib("one-at-a-time.mjs");
    const folder = await takeFolder("npm start", ${JSON.stringify(folder)});
    folder.answersAt("http://127.0.0.1:8123");
    console.log("holds it");
    setInterval(() => {}, 1000);
  `);
}

function startOrphan(option: string, { deaf = false } = {}) {
  const code = `${deaf ? "process.on('SIGTERM', () => {});" : ""} setInterval(() => {}, 1000); console.log("up")`;
  const child = spawn(process.execPath, ["-e", code, "--", option], { stdio: ["ignore", "pipe", "ignore"] });
  onTestFinished(() => void child.kill("SIGKILL"));
  return new Promise<number>((resolve) => child.stdout.once("data", () => resolve(child.pid as number)));
}

test("a second start on the same folder says where the first one answers", async () => {
  const folder = temporaryFolder();
  const first = holdInAnotherProcess(folder);
  await first.said(/holds it/);
  await expect(takeFolder("npm start", folder)).rejects.toThrow(
    `Evenswing already runs at http://127.0.0.1:8123 from this folder by "npm start" (process ${first.process.pid})`,
  );
});

test("a run that was killed leaves nothing that keeps the next one out", async () => {
  const folder = temporaryFolder();
  const first = holdInAnotherProcess(folder);
  await first.said(/holds it/);
  first.process.kill("SIGKILL");
  await first.ended;
  expect(await askHolder(folder)).toBeNull();
  const second = holdInAnotherProcess(folder);
  await second.said(/holds it/);
});

test("of two at the same moment exactly one gets the folder", async () => {
  const folder = temporaryFolder();
  const results = await Promise.all(
    Array.from({ length: 8 }, (_, pid) => takeLock(folder, () => ({ pid: 1000 + pid }))),
  );
  const winners = results.flatMap((result) => ("release" in result ? [result] : []));
  expect(winners).toHaveLength(1);
  await winners[0].release();
  expect(await askHolder(folder)).toBeNull();
});

test("ends what an earlier run left in the folder, and nothing beside it", async () => {
  const folder = temporaryFolder();
  const left = await startOrphan(`--kept-in=${folder}/data`, { deaf: true });
  const beside = await startOrphan(`--kept-in=${folder}-other`);
  const taken = runSnippet(`
    const { processesKeptIn, endProcesses } = await lib("proc.mjs");
    await endProcesses(processesKeptIn(${JSON.stringify(folder)}), 200);
    console.log("ended");
  `);
  await taken.said(/ended/);
  await until(() => !runs(left));
  expect(runs(beside)).toBe(true);
});

test("clears away the folders of killed test runs and leaves those of running ones", async () => {
  const parent = temporaryFolder();
  const killed = join(parent, "evenswing-test-killed");
  const running = join(parent, "evenswing-test-running");
  const foreign = join(parent, "something-else");
  for (const folder of [killed, running, foreign]) mkdirSync(folder);
  const holder = holdInAnotherProcess(running);
  await holder.said(/holds it/);
  const left = await startOrphan(`--datadir=${killed}/mariadb`);

  expect(await clearKilledRuns(parent)).toBe(1);

  expect(existsSync(killed)).toBe(false);
  expect(existsSync(running)).toBe(true);
  expect(existsSync(foreign)).toBe(true);
  await until(() => !runs(left));
});
