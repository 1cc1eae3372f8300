import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { catalogFiles } from "../../../seeds/catalog/files";
import { dataFolder } from "../../../seeds/catalog/read";

describe("the catalog's data files", () => {
  it.each(["mosfets.csv", "resistors.csv", "capacitors.csv"])(
    "generates %s exactly as it is committed",
    (name) => {
      const committed = readFileSync(new URL(name, dataFolder), "utf8");
      const generated = catalogFiles().get(name);
      // Compared as a whole and not line by line: a difference of a megabyte is no use printed.
      expect(generated === committed, "run npm run seeds:generate and commit what changed").toBe(true);
    },
  );
});
