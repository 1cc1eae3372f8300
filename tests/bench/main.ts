import { availableParallelism, loadavg } from "node:os";
import { parseArgs } from "node:util";
import { closePool } from "../../api/ranking/pool";
import { type BenchServer, benchHttp } from "./http-section";
import { numpyVersion } from "./numpy";
import { Report } from "./report";
import { benchSearch } from "./search-section";
import { benchYield } from "./yield-section";

const { values } = parseArgs({
  options: { json: { type: "string" }, only: { type: "string" }, server: { type: "string" } },
});

const report = new Report();
const numpy = numpyVersion();
const withNumpy = numpy !== null;
const sections: Record<string, () => Promise<void>> = {
  centred: () => benchSearch(report, "centred", withNumpy),
  assured: () => benchSearch(report, "assured", withNumpy),
  yield: async () => benchYield(report, withNumpy),
  http: async () => {
    if (!values.server) throw new Error("The server to measure is missing: run this with `npm run bench`.");
    const server: BenchServer = JSON.parse(values.server);
    await benchHttp(report, server);
  },
};
const names = Object.keys(sections);
const wanted = values.only?.split(",") ?? names;
const unknown = wanted.find((name) => !names.includes(name));
if (unknown !== undefined) throw new Error(`--only takes ${names.join(",")}; "${unknown}" is none of them.`);

report.heading(`Node ${process.versions.node}, ${withNumpy ? `NumPy ${numpy}` : "no NumPy"}`);
report.figure("processors", availableParallelism(), "");
// Above a few tenths, something else takes part of what is measured.
report.figure("load of the machine before the first figure", loadavg()[0], "");
if (!withNumpy) {
  report.note("What is held against NumPy is left out. For it, install Debian's package:");
  report.note("apt-get install --no-install-recommends python3-numpy");
}
for (const name of names) if (wanted.includes(name)) await sections[name]();
await closePool();
if (values.json) report.write(values.json);
if (report.bars.some((bar) => !bar.met)) process.exitCode = 1;
