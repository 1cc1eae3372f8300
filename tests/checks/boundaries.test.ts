import { copyFileSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { expect, onTestFinished, test } from "vitest";
import { checkBoundaries } from "../../scripts/lib/boundaries.mjs";

const root = join(import.meta.dirname, "../..");

/** A tree that keeps every law: what the planted files are added to. */
const LAWFUL: Record<string, string> = {
  "shared/values/series.ts": `export const series = [1, 2.2, 4.7];`,
  "shared/schemas/bom.ts": `import { z } from "zod";\nexport const bom = z.object({});`,
  "shared/bias/device.ts": `export const vt = 1;`,
  "shared/bias/circuits/follower/solve.ts": `import { vt } from "../../device";\nexport const solved = vt;`,
  "shared/bias/circuits/plain/solve.ts": `export const plain = 1;`,
  "shared/bias/circuits/registry.ts": `import { plain } from "./plain/solve";\nexport const all = [plain];`,
  "api/env.ts": `export const port = Number(process.env.PORT);`,
  "api/app.ts": `import { routes } from "./features/boms/routes";\nexport const app = routes;`,
  "api/db/schema/boms.ts": `export const boms = "boms";`,
  "api/db/transaction.ts": `export const transaction = 1;`,
  "api/http/problem.ts": `export const notFound = 1;`,
  "api/services/payment.ts": `import Stripe from "stripe";\nexport const payment = Stripe;`,
  "api/features/boms/routes.ts":
    `import express from "express";\nimport { list } from "./service";\n` +
    `import { bom } from "#shared/schemas/bom";\nexport const routes = [express, list, bom];`,
  "api/features/boms/service.ts":
    `import { rows } from "./queries";\nimport { transaction } from "../../db/transaction";\n` +
    `import { names } from "../parts/service";\nexport const list = [rows, transaction, names];`,
  "api/features/boms/queries.ts": `import { boms } from "../../db/schema/boms";\nexport const rows = [boms];`,
  "api/features/parts/service.ts": `import { parts } from "./queries";\nexport const names = parts;`,
  "api/features/parts/queries.ts": `export const parts = 1;`,
  "web/main.tsx": `import { pages } from "./routes";\nexport const page = pages;`,
  "web/routes.tsx": `import { Boms } from "./features/boms/boms-page";\nexport const pages = [Boms];`,
  "web/lib/api.ts": `export const ask = (path: string) => fetch(path);`,
  "web/lib/format.ts": `export const format = String;`,
  "web/ui/button.tsx": `import type { ReactNode } from "react";\nexport const Button = (child: ReactNode) => child;`,
  "web/figures/balance-bar.tsx": `import { series } from "#shared/values/series";\nexport const Bar = series;`,
  "web/features/boms/boms-page.tsx": `import { Button } from "../../ui/button";\nimport { ask } from "../../lib/api";\nexport const Boms = [Button, ask];`,
  "web/features/parts/parts-page.tsx": `export const Parts = 1;`,
  "seeds/load.ts": `import { boms } from "../api/db/schema/boms";\nexport const load = boms;`,
  "scripts/start.mjs": `import { join } from "node:path";\nexport const path = join;`,
};

/** Stand in for packages, so that the product's own may change. */
const PACKAGES = ["zod", "express", "react", "@tanstack/react-query", "stripe"];

function tree(planted: Record<string, string> = {}): string {
  const folder = mkdtempSync(join(tmpdir(), "evenswing-boundaries-"));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  for (const name of ["package.json", ".dependency-cruiser.cjs"])
    copyFileSync(join(root, name), join(folder, name));
  for (const name of PACKAGES) {
    write(
      folder,
      `node_modules/${name}/package.json`,
      JSON.stringify({ name, type: "module", main: "main.js" }),
    );
    write(folder, `node_modules/${name}/main.js`, "export default 1;");
  }
  for (const [file, source] of Object.entries({ ...LAWFUL, ...planted })) write(folder, file, source);
  return folder;
}

function write(folder: string, file: string, source: string) {
  mkdirSync(dirname(join(folder, file)), { recursive: true });
  writeFileSync(join(folder, file), source);
}

/** One file each that breaks exactly one law: the file, its source, the law. */
const PLANTED: [file: string, source: string, law: string][] = [
  ["shared/values/to-api.ts", `import "../../api/env";`, "shared-stands-alone"],
  [
    "shared/values/to-web.ts",
    `import type { Bar } from "../../web/figures/balance-bar";`,
    "shared-stands-alone",
  ],
  ["shared/values/to-node.ts", `import { readFileSync } from "node:fs";`, "shared-stands-alone"],
  ["shared/values/to-package.ts", `import { useState } from "react";`, "shared-stands-alone"],
  ["shared/bias/circuits/follower/to-plain.ts", `import "../plain/solve";`, "circuits-stay-apart"],
  ["shared/bias/circuits/follower/to-registry.ts", `import "../registry";`, "circuits-stay-apart"],
  ["api/http/to-web.ts", `import type { page } from "../../web/main";`, "api-stands-alone"],
  ["api/http/to-seeds.ts", `import "../../seeds/load";`, "api-stands-alone"],
  ["api/features/lots/routes.ts", `import { boms } from "../../db/schema/boms";`, "routes-call-services"],
  ["api/features/seats/routes.ts", `import "./queries";`, "routes-call-services"],
  ["api/features/seats/queries.ts", `import "../../services/payment";`, "queries-call-nobody"],
  ["api/features/fits/service.ts", `import type { Request } from "express";`, "services-know-no-http"],
  ["api/features/stages/service.ts", `import "../../db/schema/boms";`, "services-ask-queries"],
  ["api/features/reviews/queries.ts", `import "./service";`, "queries-call-nobody"],
  ["api/features/reviews/service.ts", `import "../parts/queries";`, "api-features-meet-in-services"],
  ["api/db/client.ts", `import type { list } from "../features/boms/service";`, "db-knows-no-feature"],
  ["api/features/seats/service.ts", `import Stripe from "stripe";`, "sdk-only-in-services"],
  ["api/http/session.ts", `import { env } from "node:process";`, "environment-only-in-env"],
  ["api/http/limits.ts", `export const limit = process.env.LIMIT;`, "environment-only-in-env"],
  ["web/lib/to-api.ts", `import type { app } from "../../api/app";`, "web-stands-alone"],
  ["web/lib/to-node.ts", `import { join } from "node:path";`, "web-stands-alone"],
  [
    "web/ui/to-feature.tsx",
    `import { Boms } from "../features/boms/boms-page";`,
    "primitives-know-no-feature",
  ],
  ["web/ui/to-api-client.tsx", `import { ask } from "../lib/api";`, "primitives-know-no-feature"],
  ["web/figures/asks.tsx", `export const asked = fetch("/api/v1/boms");`, "primitives-know-no-feature"],
  [
    "web/figures/queries.tsx",
    `import { useQuery } from "@tanstack/react-query";`,
    "primitives-know-no-feature",
  ],
  ["web/lib/to-feature.ts", `import "../features/boms/boms-page";`, "lib-knows-no-feature"],
  ["web/features/boms/to-parts.tsx", `import "../parts/parts-page";`, "web-features-stay-apart"],
  ["web/features/boms/index.ts", `export { Boms } from "./boms-page";`, "no-barrels"],
  ["web/lib/nowhere.ts", `import "./not-there";`, "imports-resolve"],
  ["scripts/needy.mjs", `import "zod";`, "scripts-need-no-package"],
  ["seeds/to-web.ts", `import "../web/lib/format";`, "seeds-know-no-interface"],
];

test("a tree that keeps every law passes", async () => {
  expect(await checkBoundaries(tree())).toEqual({ modules: Object.keys(LAWFUL).length, violations: [] });
});

test("each law catches what is planted against it, and nothing else is caught", async () => {
  const folder = tree(Object.fromEntries(PLANTED.map(([file, source]) => [file, source])));
  const { violations } = await checkBoundaries(folder);
  const caught = new Set(violations.map(({ law, file }) => `${law}: ${file}`));
  expect([...caught].sort()).toEqual(PLANTED.map(([file, , law]) => `${law}: ${file}`).sort());
});

test("a circle of imports is caught and shown whole", async () => {
  const folder = tree({
    "shared/values/one.ts": `import "./two";`,
    "shared/values/two.ts": `import "./three";`,
    "shared/values/three.ts": `import "./one";`,
  });
  const { violations } = await checkBoundaries(folder);
  expect(violations.map(({ law }) => law)).toEqual(["no-circles"]);
  for (const name of ["one", "two", "three"])
    expect(violations[0].sentence).toContain(`shared/values/${name}.ts`);
});

test("fails where modules were left unread, and says which", async () => {
  const folder = tree({ "web/ui/unread.tsx": "export const unread = 1;" });
  const rules = join(folder, ".dependency-cruiser.cjs");
  copyFileSync(rules, join(folder, "rules.cjs"));
  writeFileSync(
    rules,
    `const rules = require("./rules.cjs");
     module.exports = { ...rules, options: { ...rules.options, exclude: { path: "unread" } } };`,
  );
  const modules = Object.keys(LAWFUL).length + 1;
  await expect(checkBoundaries(folder)).rejects.toThrow(
    `read ${modules - 1} of ${modules} modules. It left out:\n    web/ui/unread.tsx`,
  );
});

test("fails where there is nothing to read", async () => {
  const folder = tree();
  for (const name of ["api", "shared", "web", "seeds", "scripts"])
    rmSync(join(folder, name), { recursive: true });
  await expect(checkBoundaries(folder)).rejects.toThrow(/read 0 of 0 modules|gave no report/);
});
