import { requireNode } from "./lib/node-version.mjs";

requireNode();
const { startProduct } = await import("./lib/start-product.mjs");
await startProduct(process.argv.slice(2));
