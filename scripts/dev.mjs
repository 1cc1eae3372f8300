import { requireNode } from "./lib/node-version.mjs";

requireNode();
const { developProduct } = await import("./lib/develop-product.mjs");
await developProduct();
