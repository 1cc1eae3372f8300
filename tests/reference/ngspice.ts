import { spawnSync } from "node:child_process";
import type { Device, StageValues } from "#shared/schemas/bias";

/** A simulation that takes longer than this is stuck. */
const TIME_LIMIT_MS = 20_000;

/**
 * Operating points of stages, solved by ngspice (Debian) with its level-1 model: an independent solver of the same
 * device law. KP is 2K at W = L, junction leakage and gmin are made negligible, P-channel stages are drawn mirrored.
 *
 * @returns drain current and drain-source voltage as magnitudes, in the order asked
 * @throws Error with ngspice's own words when it fails
 */
export function simulateOperatingPoints(
  cases: readonly { device: Device; stage: StageValues }[],
): { id: number; vds: number }[] {
  const lines = ["* operating points"];
  const prints: string[] = [];
  cases.forEach(({ device, stage }, n) => {
    const sign = device.polarity === "n" ? 1 : -1;
    const source = stage.rs > 0 ? `s${n}` : "0";
    lines.push(
      `vdd${n} vdd${n} 0 ${sign * stage.vdd}`,
      `r1${n} vdd${n} g${n} ${stage.r1}`,
      `r2${n} g${n} 0 ${stage.r2}`,
      `rd${n} vdd${n} d${n} ${stage.rd}`,
      ...(stage.rs > 0 ? [`rs${n} s${n} 0 ${stage.rs}`] : []),
      `m${n} d${n} g${n} ${source} ${source} model${n} w=1u l=1u`,
      `.model model${n} ${device.polarity}mos level=1 vto=${sign * device.vt} kp=${2 * device.k} lambda=${device.lambda} is=1e-30`,
    );
    const drain = `v(d${n})${stage.rs > 0 ? `-v(s${n})` : ""}`;
    prints.push(`let i${n} = (v(vdd${n})-v(d${n}))/${stage.rd}`, `let u${n} = ${drain}`, `print i${n} u${n}`);
  });
  lines.push(
    ".options gmin=1e-18 reltol=1e-8 abstol=1e-16 vntol=1e-9 numdgt=10",
    ".control",
    "set numdgt=10",
    "op",
    ...prints,
    ".endc",
    ".end",
  );
  const run = spawnSync("ngspice", ["-b"], {
    input: `${lines.join("\n")}\n`,
    encoding: "utf8",
    timeout: TIME_LIMIT_MS,
  });
  if (run.error) throw run.error;
  return cases.map((_, n) => ({ id: read(run.stdout, `i${n}`), vds: read(run.stdout, `u${n}`) }));
}

function read(output: string, name: string): number {
  const found = output.split("\n").find((line) => line.startsWith(`${name} = `));
  if (!found) throw new Error(`ngspice printed no ${name}:\n${output.slice(-2000)}`);
  return Math.abs(Number(found.slice(name.length + 3)));
}
