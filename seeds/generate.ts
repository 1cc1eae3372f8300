import { mkdirSync, writeFileSync } from "node:fs";
import { catalogFiles } from "./catalog/files";
import { dataFolder } from "./catalog/read";

mkdirSync(dataFolder, { recursive: true });
for (const [name, contents] of catalogFiles()) {
  writeFileSync(new URL(name, dataFolder), contents);
  console.log(`${name}: ${contents.split("\n").length - 2} lines, ${Math.round(contents.length / 1024)} KiB`);
}
