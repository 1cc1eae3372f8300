import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { addTallies, tallyPlaywright, tallyVitest } from "../../scripts/lib/tally.mjs";
import { temporaryFolder } from "./snippet";

function report(contents: unknown): string {
  const file = join(temporaryFolder(), "report.json");
  writeFileSync(file, JSON.stringify(contents));
  return file;
}

const statuses = (...list: string[]) => list.map((status) => ({ status }));

test("counts passed, failed and skipped tests", () => {
  const file = report({
    testResults: [
      { status: "passed", assertionResults: statuses("passed", "passed", "pending") },
      { status: "failed", assertionResults: statuses("passed", "failed") },
    ],
  });
  expect(tallyVitest(file, 1)).toEqual({ passed: 3, failed: 1, skipped: 1 });
});

test("a test file that can't be loaded is a failure", () => {
  const file = report({
    testResults: [
      { status: "passed", assertionResults: statuses("passed") },
      { status: "failed", assertionResults: [] },
    ],
  });
  expect(tallyVitest(file, 1)).toEqual({ passed: 1, failed: 1, skipped: 0 });
});

test("a run that ends badly without naming a test is a failure", () => {
  const file = report({ testResults: [{ status: "passed", assertionResults: statuses("passed") }] });
  expect(tallyVitest(file, 1)).toEqual({ passed: 1, failed: 1, skipped: 0 });
  expect(tallyPlaywright(report({ stats: { expected: 2, unexpected: 0, flaky: 0, skipped: 0 } }), 1)).toEqual(
    {
      passed: 2,
      failed: 1,
      skipped: 0,
    },
  );
});

test("a run without a report is a failure", () => {
  expect(tallyVitest("/nowhere/report.json", 137)).toEqual({ passed: 0, failed: 1, skipped: 0 });
  expect(tallyPlaywright("/nowhere/report.json", 137)).toEqual({ passed: 0, failed: 1, skipped: 0 });
});

test("a journey that passes only at a second try is a failure", () => {
  const file = report({ stats: { expected: 4, unexpected: 1, flaky: 1, skipped: 2 } });
  expect(tallyPlaywright(file, 1)).toEqual({ passed: 4, failed: 2, skipped: 2 });
});

test("sums up", () => {
  const sum = addTallies([
    { passed: 1, failed: 0, skipped: 2 },
    { passed: 10, failed: 3, skipped: 0 },
  ]);
  expect(sum).toEqual({ passed: 11, failed: 3, skipped: 2 });
});
