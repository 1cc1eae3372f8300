import { requireNode } from "./lib/node-version.mjs";

requireNode();
const { benchProduct } = await import("./lib/bench-product.mjs");
await benchProduct(process.argv.slice(2));
