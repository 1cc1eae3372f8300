import { requireNode } from "./lib/node-version.mjs";

requireNode();
const { testProduct } = await import("./lib/test-product.mjs");
await testProduct(process.argv.slice(2));
