import { defineConfig } from "@playwright/test";

export default defineConfig({
  testDir: "tests/journeys",
  testMatch: "**/*.spec.ts",
  outputDir: "test-results",
  retries: 0,
  workers: 2,
  forbidOnly: true,
  timeout: 90_000,
  // Two cores run browser, server and search at once.
  expect: { timeout: 20_000 },
  globalTimeout: 20 * 60_000,
  // `npm test` counts from the JSON report; started by hand, there is none.
  reporter: process.env.PLAYWRIGHT_JSON_OUTPUT_FILE ? [["list"], ["json"]] : [["list"]],
  use: {
    // `npm test` starts a product of its own; started by hand, journeys go through the one of `npm start`.
    baseURL: process.env.EVENSWING_URL ?? "http://127.0.0.1:8080",
    trace: "retain-on-failure",
    screenshot: "only-on-failure",
    viewport: { width: 1440, height: 900 },
    launchOptions: {
      executablePath: "/usr/bin/chromium",
      args: [
        "--no-sandbox",
        "--disable-gpu",
        "--disable-quic",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
      ],
    },
  },
});
