import { parseArgs } from "node:util";
import { closePool } from "../../api/ranking/pool";
import { numpyVersion } from "./numpy";
import { Report } from "./report";
import { benchSearch } from "./search-section";

const SECTIONS = ["centred", "assured"] as const;

const { values } = parseArgs({ options: { json: { type: "string" }, only: { type: "string" } } });
const wanted = values.only?.split(",") ?? SECTIONS;
const unknown = wanted.filter((name) => !SECTIONS.some((section) => section === name));
if (unknown.length > 0) throw new Error(`--only takes ${SECTIONS.join(",")}; not ${unknown.join(",")}.`);
const isWanted = (section: (typeof SECTIONS)[number]) => wanted.includes(section);

const report = new Report();
const numpy = numpyVersion();
if (!numpy) {
  report.note(
    "NumPy is not measured and its bars are left out: install it with " +
      "`apt-get install --no-install-recommends python3-numpy`.",
  );
}
if (isWanted("centred")) await benchSearch(report, "centred", numpy !== null);
if (isWanted("assured")) await benchSearch(report, "assured", numpy !== null);
await closePool();
if (values.json) report.write(values.json);
if (report.bars.some((bar) => !bar.met)) process.exitCode = 1;
