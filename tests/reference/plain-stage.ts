/**
 * Stages of every circuit as their circuit laws read, solved by halving: slow and plain on purpose, written apart from
 * the engine and sharing no code with it.
 */

export type PlainCircuit = "four-resistor" | "split-source" | "follower" | "drain-feedback" | "negative-rail";

export type PlainDevice = { vt: number; k: number; lambda: number };

/** Rails in volts, resistors in ohms; null is no load, 0 a resistor that isn't there. */
export type PlainStage = {
  circuit: PlainCircuit;
  vdd: number;
  vss: number;
  r1: number;
  r2: number;
  rg: number;
  rd: number;
  rs: number;
  rs2: number;
  load: number | null;
  bypassed: boolean;
};

export type PlainPoint = { id: number; vgs: number; vds: number; up: number; down: number };

/** Where a function that falls from above zero to below crosses it. */
export function halve(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  for (let step = 0; step < 64; step++) {
    const middle = (a + b) / 2;
    if (f(middle) > 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

const besideLoad = (r: number, load: number | null) => (load === null ? r : 1 / (1 / r + 1 / load));

/** Gate-source and drain-source voltage at a drain current, by Kirchhoff's laws. */
function directVoltages(s: PlainStage, i: number): { vgs: number; vds: number } {
  if (s.circuit === "negative-rail") {
    const source = i * s.rs - s.vss;
    return { vgs: -source, vds: s.vdd - i * s.rd - source };
  }
  const source = i * (s.rs + s.rs2);
  if (s.circuit === "drain-feedback") {
    // RD carries the drain current and what RG and R2 take to ground.
    const drain = s.r2 === 0 ? s.vdd - i * s.rd : (s.vdd / s.rd - i) / (1 / s.rd + 1 / (s.rg + s.r2));
    const gate = s.r2 === 0 ? drain : (drain * s.r2) / (s.rg + s.r2);
    return { vgs: gate - source, vds: drain - source };
  }
  const gate = (s.vdd * s.r2) / (s.r1 + s.r2);
  return { vgs: gate - source, vds: s.vdd - i * s.rd - source };
}

/** How the output and the device's voltages move with a change of drain current i and of the gate v. */
export function signalVoltages(
  s: PlainStage,
  i: number,
  v: number,
): { vgs: number; vds: number; out: number } {
  if (s.circuit === "follower") {
    const out = i * besideLoad(s.rs, s.load);
    return { vgs: v - out, vds: -out, out };
  }
  const inSource = s.circuit === "split-source" ? s.rs : s.bypassed ? 0 : s.rs;
  const passed = s.circuit === "drain-feedback" ? v / s.rg : 0;
  const feedback = s.circuit === "drain-feedback" ? 1 / s.rg : 0;
  const drain = (passed - i) / (1 / besideLoad(s.rd, s.load) + feedback);
  return { vgs: v - i * inSource, vds: drain - i * inSource, out: -drain };
}

/** What part of the source resistors a signal meets. */
export function degeneration(s: PlainStage): number {
  return -signalVoltages(s, 1, 0).vgs;
}

/** The Q-point of a saturated stage with the room each way; null where it isn't saturated. */
export function plainPoint({ vt, k, lambda }: PlainDevice, s: PlainStage): PlainPoint | null {
  const off = directVoltages(s, 0);
  if (off.vgs <= vt) return null;
  const perAmpere = off.vds - directVoltages(s, 1).vds;
  const id = halve(
    (i) => {
      const { vgs, vds } = directVoltages(s, i);
      return (vgs > vt ? k * (vgs - vt) ** 2 * (1 + lambda * vds) : 0) - i;
    },
    0,
    off.vds / perAmpere,
  );
  const { vgs, vds } = directVoltages(s, id);
  if (vds < vgs - vt) return null;
  const inSource = degeneration(s);
  // At the edge of saturation vDS = vGS - VT = w and iD = K w² (1 + λ w); w is what the circuit leaves there.
  const w = halve(
    (edge) => {
      const change = k * edge * edge * (1 + lambda * edge) - id;
      const input = edge + vt - vgs + change * inSource;
      return vds + signalVoltages(s, change, input).vds - edge;
    },
    0,
    2 * vds + 10,
  );
  const change = k * w * w * (1 + lambda * w) - id;
  const atEdge = signalVoltages(s, change, w + vt - vgs + change * inSource);
  const atCutoff = signalVoltages(s, -id, vt - vgs - id * inSource);
  return { id, vgs, vds, up: -atCutoff.out, down: atEdge.out };
}

/** The largest and smallest of a value's range. */
type Range = [number, number];

export type PlainBox = {
  vt: Range;
  k: Range;
  lambda: number;
  /** V/K. */
  tcVt: number;
  stage: PlainStage;
  resistors: number;
  rail: number;
  ambient: Range;
};

/** The builds with the least swing, for which the inside of the ambient range is looked through. */
const LOOKED_THROUGH = 4;

/**
 * The least symmetric swing over a box of builds: every corner of rails, resistors, K and threshold at both ends of
 * the ambient range, and for the worst of these the valley that the range may hold.
 */
export function plainAssured(box: PlainBox): number {
  const { stage } = box;
  const [coldest, hottest] = box.ambient;
  const names = (["vdd", "vss", "r1", "r2", "rg", "rd", "rs", "rs2"] as const).filter(
    (name) => stage[name] > 0,
  );
  const worst: { least: number; room: (celsius: number) => number }[] = [];
  for (let bits = 0; bits < 1 << names.length; bits++) {
    const build = { ...stage };
    names.forEach((name, at) => {
      const tolerance = name === "vdd" || name === "vss" ? box.rail : box.resistors;
      build[name] *= 1 + (bits & (1 << at) ? tolerance : -tolerance);
    });
    for (const k of box.k) {
      for (const vt of box.vt) {
        const room = (celsius: number) => {
          const device = {
            vt: vt + box.tcVt * (celsius - 25),
            k: k * ((celsius + 273.15) / 298.15) ** -1.5,
            lambda: box.lambda,
          };
          const point = plainPoint(device, build);
          return point ? Math.min(point.up, point.down) : 0;
        };
        const least = coldest === hottest ? room(coldest) : Math.min(room(coldest), room(hottest));
        if (least <= 0) return 0;
        worst.push({ least, room });
      }
    }
  }
  worst.sort((a, b) => a.least - b.least);
  if (coldest === hottest) return worst[0].least;
  return Math.min(
    worst[0].least,
    ...worst.slice(0, LOOKED_THROUGH).map(({ room }) => lowestInside(room, coldest, hottest)),
  );
}

/** The lowest value inside a range that has one valley at most. */
function lowestInside(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  for (let step = 0; step < 60; step++) {
    const left = a + (b - a) / 3;
    const right = b - (b - a) / 3;
    if (f(left) < f(right)) b = right;
    else a = left;
  }
  return f((a + b) / 2);
}
