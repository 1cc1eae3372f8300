import { parseArgs } from "node:util";
import { closePool } from "../../api/ranking/pool";
import { benchExactSearch } from "./exact-search";
import { Report } from "./report";

const { values } = parseArgs({ options: { json: { type: "string" } } });
const report = new Report();
await benchExactSearch(report);
await closePool();
if (values.json) report.write(values.json);
if (report.bars.some((bar) => !bar.met)) process.exitCode = 1;
