import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";

/** A simulation that takes longer than this is stuck. */
const TIME_LIMIT_MS = 20_000;

/** The values of each vector of one analysis, point by point; complex values by their magnitude. */
export type Vectors = { points: number; of: (name: string) => number[] };

/**
 * Runs ngspice (Debian) on a circuit: an independent solver of the same device law. Junction leakage and gmin are
 * made negligible, and tolerances tight.
 *
 * @param elements the netlist's lines, without title and end
 * @param analyses commands such as `op` or `ac dec 20 1 1e6`, run one after the other on the same circuit
 * @param save the vectors to keep, such as `v(d1)`
 * @returns the vectors of each analysis, in the order asked
 * @throws Error with ngspice's own words when it fails or takes too long
 */
export function runNgspice(
  elements: readonly string[],
  analyses: readonly string[],
  save: readonly string[],
): Vectors[] {
  const folder = mkdtempSync(join(tmpdir(), "evenswing-ngspice-"));
  try {
    const netlist = [
      "* stages",
      ...elements,
      ".options gmin=1e-18 reltol=1e-8 abstol=1e-12 vntol=1e-9 itl1=1000 itl2=1000",
      ".control",
      "set filetype=ascii",
      ...save.map((vector) => `save ${vector}`),
      ...analyses.flatMap((analysis, n) => [analysis, `write ${n}.raw`]),
      ".endc",
      ".end",
    ];
    const run = spawnSync("ngspice", ["-b"], {
      cwd: folder,
      input: `${netlist.join("\n")}\n`,
      encoding: "utf8",
      timeout: TIME_LIMIT_MS,
      maxBuffer: 1 << 26,
    });
    if (run.error) throw run.error;
    return analyses.map((analysis, n) => {
      try {
        return parseRaw(readFileSync(join(folder, `${n}.raw`), "latin1"));
      } catch (cause) {
        const words = `${run.stdout.slice(-1000)}\n${run.stderr.slice(-2000)}`;
        throw new Error(`ngspice gave no "${analysis}":\n${words}`, { cause });
      }
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Reads ngspice's ASCII raw file: a head, the names of the vectors, then each point's values one a line. */
function parseRaw(text: string): Vectors {
  const points = Number(/^No\. Points:\s*(\d+)/m.exec(text)?.[1]);
  const head = text.indexOf("\nVariables:");
  const body = text.indexOf("\nValues:");
  const names = text
    .slice(head, body)
    .split("\n")
    .slice(2)
    .map((line) => line.trim().split(/\s+/)[1])
    .filter((name) => name !== undefined);
  const tokens = text
    .slice(body + "\nValues:".length)
    .split(/\s+/)
    .filter((token) => token !== "");
  const stride = names.length + 1;
  if (!(points > 0) || tokens.length !== points * stride) throw new Error("Not a whole raw file");
  return {
    points,
    of: (name) => {
      const at = names.indexOf(name.toLowerCase());
      if (at < 0) throw new Error(`ngspice kept no ${name}`);
      return Array.from({ length: points }, (_, point) => magnitude(tokens[point * stride + 1 + at]));
    },
  };
}

function magnitude(token: string): number {
  const [re, im] = token.split(",").map(Number);
  return im === undefined ? re : Math.hypot(re, im);
}
