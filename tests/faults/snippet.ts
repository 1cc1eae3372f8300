import { type ChildProcess, spawn } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { onTestFinished } from "vitest";

const library = new URL("../../scripts/lib/", import.meta.url).href;

/** A piece of a script that runs as a process of its own, so that it can be killed. */
export type Snippet = {
  process: ChildProcess;
  /** Waits for a line that matches; gives the match. */
  said: (pattern: RegExp) => Promise<RegExpExecArray>;
  ended: Promise<{ code: number | null; signal: NodeJS.Signals | null; lines: string[] }>;
};

/**
 * Runs a few lines as a script of its own; `lib("ports.mjs")` in them imports one of the scripts' modules.
 *
 * @param code the body of a module
 */
export function runSnippet(code: string): Snippet {
  const whole = `const lib = (name) => import(${JSON.stringify(library)} + name);\n${code}`;
  const child = spawn(process.execPath, ["--input-type=module", "-e", whole], {
    stdio: ["ignore", "pipe", "pipe"],
  });
  onTestFinished(() => void child.kill("SIGKILL"));
  const lines: string[] = [];
  const listeners = new Set<(line: string) => void>();
  for (const input of [child.stdout, child.stderr]) {
    createInterface({ input }).on("line", (line) => {
      lines.push(line);
      for (const listener of listeners) listener(line);
    });
  }
  const ended: Snippet["ended"] = new Promise((resolve) => {
    child.once("close", (exitCode, signal) => resolve({ code: exitCode, signal, lines }));
  });
  const said: Snippet["said"] = (pattern) =>
    new Promise((resolve, reject) => {
      const look = (line: string) => {
        const match = pattern.exec(line);
        if (match) resolve(match);
        return match !== null;
      };
      if (lines.some(look)) return;
      listeners.add(look);
      ended.then(() => reject(new Error(`It ended without saying ${pattern}:\n${lines.join("\n")}`)));
    });
  return { process: child, said, ended };
}

/** An empty folder that goes away with the test. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), "evenswing-fault-"));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

/**
 * Waits until something holds that nothing announces.
 *
 * @param holds asked every few milliseconds
 * @throws {Error} after twenty seconds
 */
export async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  const deadline = performance.now() + 20_000;
  while (!(await holds())) {
    if (performance.now() > deadline) throw new Error("It did not come to pass in twenty seconds.");
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}
