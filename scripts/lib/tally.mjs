import { readFileSync } from "node:fs";

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */

/** @returns {Tally} */
export function emptyTally() {
  return { passed: 0, failed: 0, skipped: 0 };
}

/**
 * @param {Tally[]} tallies
 * @returns {Tally}
 */
export function addTallies(tallies) {
  const sum = emptyTally();
  for (const { passed, failed, skipped } of tallies) {
    sum.passed += passed;
    sum.failed += failed;
    sum.skipped += skipped;
  }
  return sum;
}

/**
 * Counts what Vitest reported. A file that could not even be loaded counts as one failure, and so does a run that
 * ended badly without naming a failed test.
 *
 * @param {string} reportFile written by its json reporter
 * @param {number} exitCode
 * @returns {Tally}
 */
export function tallyVitest(reportFile, exitCode) {
  const tally = emptyTally();
  for (const file of readReport(reportFile)?.testResults ?? []) {
    for (const { status } of file.assertionResults) {
      if (status === "passed") tally.passed += 1;
      else if (status === "failed") tally.failed += 1;
      else tally.skipped += 1;
    }
    const named = file.assertionResults.some(
      (/** @type {{ status: string }} */ test) => test.status === "failed",
    );
    if (file.status === "failed" && !named) tally.failed += 1;
  }
  return withUnnamedFailure(tally, exitCode);
}

/**
 * Counts what Playwright reported; a journey that passed only at a second try counts as failed.
 *
 * @param {string} reportFile written by its json reporter
 * @param {number} exitCode
 * @returns {Tally}
 */
export function tallyPlaywright(reportFile, exitCode) {
  const stats = readReport(reportFile)?.stats ?? { expected: 0, unexpected: 0, flaky: 0, skipped: 0 };
  const tally = { passed: stats.expected, failed: stats.unexpected + stats.flaky, skipped: stats.skipped };
  return withUnnamedFailure(tally, exitCode);
}

/**
 * @param {Tally} tally
 * @param {number} exitCode
 */
function withUnnamedFailure(tally, exitCode) {
  return exitCode !== 0 && tally.failed === 0 ? { ...tally, failed: 1 } : tally;
}

/** @param {string} file */
function readReport(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return null;
  }
}

/**
 * Says a tally in words for a step's line.
 *
 * @param {Tally} tally
 */
export function describeTally({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ""}`;
}
