import { existsSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";

/** Reads .env where there is one; what is set already counts more. */
export function readEnvFile() {
  const file = join(root, ".env");
  if (existsSync(file)) process.loadEnvFile(file);
}
