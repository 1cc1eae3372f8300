import { expect, onTestFinished, test, vi } from "vitest";
import { keepRunning } from "../../scripts/lib/keep-running.mjs";
import { runs } from "../../scripts/lib/proc.mjs";
import { launch, run } from "../../scripts/lib/programs.mjs";
import { runSnippet, until } from "./snippet";

const longLived = `[process.execPath, ["-e", "setInterval(() => {}, 1000)"]]`;

test("what a script started ends with it, even when it is killed", async () => {
  const script = runSnippet(`
    const { launch } = await lib("programs.mjs");
    console.log("child", launch(...${longLived}).pid);
  `);
  const child = Number((await script.said(/child (\d+)/))[1]);
  await until(() => runs(child));
  script.process.kill("SIGKILL");
  await until(() => !runs(child));
});

test.each(["SIGINT", "SIGTERM"] as const)(
  "after %s everything is stopped, latest first, and it ends well",
  async (signal) => {
    const script = runSnippet(`
    const { runScript, whenEnding } = await lib("lifetime.mjs");
    const { launch } = await lib("programs.mjs");
    await runScript(async () => {
      whenEnding(() => console.log("first thing undone"));
      console.log("child", launch(...${longLived}).pid);
      whenEnding(() => console.log("second thing undone"));
      return new Promise(() => {});
    }, { interrupted: 0 });
  `);
    const child = Number((await script.said(/child (\d+)/))[1]);
    script.process.kill(signal);
    const { code, lines } = await script.ended;
    expect(code).toBe(0);
    expect(lines.slice(1)).toEqual(["Stopping ...", "second thing undone", "first thing undone", "Stopped."]);
    expect(runs(child)).toBe(false);
  },
);

test("a failure is told in a sentence, and what was begun is undone", async () => {
  const script = runSnippet(`
    const { runScript, whenEnding } = await lib("lifetime.mjs");
    const { Trouble } = await lib("trouble.mjs");
    await runScript(async () => {
      whenEnding(() => console.log("undone"));
      throw new Trouble("The disk is full.", ["its last line"]);
    }, { interrupted: 0 });
  `);
  const { code, lines } = await script.ended;
  expect(code).toBe(1);
  expect(lines.toSorted()).toEqual(["    its last line", "The disk is full.", "undone"]);
});

test("a program's bad end is told with its last lines", async () => {
  const code = "for (let i = 1; i <= 40; i++) console.log('line ' + i); process.exit(3)";
  const failed = run(process.execPath, ["-e", code], { failure: "It could not be done. It said last:" });
  await expect(failed).rejects.toThrow(/^It could not be done\. It said last:\n {4}line 16\n[\s\S]*line 40$/);
});

test("a program that isn't there is told like any other failure", async () => {
  const failed = run("evenswing-has-no-such-program", [], { failure: "It could not be done. It said last:" });
  await expect(failed).rejects.toThrow(/evenswing-has-no-such-program/);
});

test("a program that ignores being asked to end is made to", async () => {
  const program = launch(
    process.execPath,
    ["-e", "process.on('SIGTERM', () => {}); console.log('deaf'); setInterval(() => {}, 1000)"],
    { graceMs: 100 },
  );
  await until(() => program.lastLines().includes("deaf"));
  await program.stop();
  expect(await program.exited).toEqual({ code: null, signal: "SIGKILL" });
});

test("a program that ends by itself is started again three times, then given up", async () => {
  vi.spyOn(console, "log").mockImplementation(() => undefined);
  onTestFinished(() => void vi.restoreAllMocks());
  let starts = 0;
  const failing = () => {
    starts += 1;
    return launch(process.execPath, ["-e", "process.exit(7)"]);
  };
  await expect(keepRunning("The server", failing(), async () => failing())).rejects.toThrow(
    "The server ends again and again (last: exit code 7).",
  );
  expect(starts).toBe(4);
});
