import { availableParallelism } from "node:os";
import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    maxWorkers: Math.max(2, availableParallelism()),
    projects: [
      project("domain", ["tests/domain/**/*.test.ts"]),
      project("reference", ["tests/reference/**/*.test.ts"], { testTimeout: 60_000 }),
      project("api", ["tests/api/**/*.test.ts"], {
        globalSetup: ["tests/support/global-setup.ts"],
        testTimeout: 20_000,
        hookTimeout: 30_000,
      }),
      project("ui", ["tests/ui/**/*.test.tsx"], { environment: "happy-dom", testTimeout: 15_000 }),
      project("faults", ["tests/faults/**/*.test.ts"], { testTimeout: 60_000, hookTimeout: 60_000 }),
      project("checks", ["tests/checks/**/*.test.ts"], { testTimeout: 60_000, hookTimeout: 60_000 }),
    ],
  },
});

function project(name: string, include: string[], options: Record<string, unknown> = {}) {
  return { extends: true as const, test: { name, include, environment: "node", ...options } };
}
