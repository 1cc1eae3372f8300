/**
 * Every combination, tried in turn: the ranking as its definition reads, written apart from the engine and sharing no
 * code with it. Each root is found by halving, each circuit solved by elimination; slow and plain on purpose.
 */

export type PlainPart = {
  id: number;
  partNumber: string;
  polarity: "n" | "p";
  vtTyp: number;
  kTyp: number;
  lambda: number;
  ciss: number;
  coss: number;
  crss: number;
  vdss: number;
  pd25: number;
  tjMax: number;
};

/** The brief's conditions, flat; a limit left out does not bind. */
export type PlainBrief = {
  vdd: number;
  load: number | null;
  sourceImpedance: number;
  sourceResistor: "bypassed" | "unbypassed" | "none";
  divider: number[];
  drain: number[];
  source: number[];
  swingPeak?: number;
  gainMin?: number;
  gainMax?: number;
  inputResistanceMin?: number;
  supplyCurrentMax?: number;
  sourceDropMin?: number;
  highCornerMin?: number;
  distortionMax?: number;
  distortionPeak?: number;
  ambientMax: number;
  deratingVds: number;
  deratingPower: number;
  /** What each resistor may dissipate, W. */
  resistorPower: number;
};

export type PlainFit = {
  partId: number;
  r1: number;
  r2: number;
  rd: number;
  rs: number;
  bucket: number;
  nanovolts: number;
  supply: number;
};

/** Where a function that falls from above zero to below crosses it. */
function halve(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  for (let step = 0; step < 70; step++) {
    const middle = (a + b) / 2;
    if (f(middle) > 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

const saturated = (k: number, lambda: number, vgs: number, vt: number, vds: number) =>
  vgs > vt ? k * (vgs - vt) * (vgs - vt) * (1 + lambda * vds) : 0;

const current = (part: PlainPart, vgs: number, vds: number) => {
  const over = vgs - part.vtTyp;
  if (over <= 0) return 0;
  if (vds >= over) return part.kTyp * over * over * (1 + part.lambda * vds);
  return part.kTyp * (2 * over * vds - vds * vds) * (1 + part.lambda * vds);
};

/** Second harmonic over the fundamental of the drain voltage for a sine at the gate. */
function secondHarmonic(
  part: PlainPart,
  q: { id: number; vgs: number; vds: number },
  load: number,
  degeneration: number,
  peak: number,
): number {
  const samples = 64;
  let sin1 = 0;
  let cos2 = 0;
  for (let n = 0; n < samples; n++) {
    const angle = (2 * Math.PI * n) / samples;
    const input = peak * Math.sin(angle);
    const i = halve(
      (x) =>
        current(part, q.vgs + input - (x - q.id) * degeneration, q.vds - (x - q.id) * (load + degeneration)) -
        x,
      0,
      q.id + q.vds / (load + degeneration),
    );
    sin1 += i * Math.sin(angle);
    cos2 += i * Math.cos(2 * angle);
  }
  return Math.abs(cos2 / sin1);
}

type Complex = [number, number];
const add = (a: Complex, b: Complex): Complex => [a[0] + b[0], a[1] + b[1]];
const multiply = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
const divide = (a: Complex, b: Complex): Complex => {
  const norm = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / norm, (a[1] * b[0] - a[0] * b[1]) / norm];
};
const negative = (a: Complex): Complex => [-a[0], -a[1]];

/** Magnitude from generator to drain at a frequency: the admittance matrix of gate, drain and source, eliminated. */
function response(
  part: PlainPart,
  s: { gm: number; gds: number; load: number; rs: number; rsig: number; rin: number },
  hertz: number,
): number {
  const jw = (farads: number): Complex => [0, 2 * Math.PI * hertz * farads];
  const cgs = jw(part.ciss - part.crss);
  const cgd = jw(part.crss);
  const cds = jw(part.coss - part.crss);
  // A wire is a nano-ohm here, so that one matrix serves every case.
  const drive = 1 / Math.max(s.rsig, 1e-9);
  const matrix: Complex[][] = [
    [add([drive + 1 / s.rin, 0], add(cgs, cgd)), negative(cgd), negative(cgs), [drive, 0]],
    [
      add([s.gm, 0], negative(cgd)),
      add([1 / s.load + s.gds, 0], add(cgd, cds)),
      add([-s.gm - s.gds, 0], negative(cds)),
      [0, 0],
    ],
    [
      add([-s.gm, 0], negative(cgs)),
      add([-s.gds, 0], negative(cds)),
      add([1 / Math.max(s.rs, 1e-9) + s.gm + s.gds, 0], add(cgs, cds)),
      [0, 0],
    ],
  ];
  for (let column = 0; column < 3; column++) {
    for (let row = column + 1; row < 3; row++) {
      const factor = divide(matrix[row][column], matrix[column][column]);
      for (let at = column; at < 4; at++) {
        matrix[row][at] = add(matrix[row][at], negative(multiply(factor, matrix[column][at])));
      }
    }
  }
  const source = divide(matrix[2][3], matrix[2][2]);
  const drain = divide(add(matrix[1][3], negative(multiply(matrix[1][2], source))), matrix[1][1]);
  return Math.hypot(drain[0], drain[1]);
}

/** Whether the gain stays within 3 dB of mid-band from 1 Hz up to a frequency. */
function staysUp(part: PlainPart, s: Parameters<typeof response>[1], hertz: number): boolean {
  const least = response(part, s, 0) / Math.SQRT2;
  for (let f = 1; f < hertz; f *= 1.05) if (response(part, s, f) < least) return false;
  return response(part, s, hertz) >= least;
}

/** Solves one combination and checks every condition; null when one fails. */
function tryCombination(
  brief: PlainBrief,
  part: PlainPart,
  r1: number,
  r2: number,
  rd: number,
  rs: number,
): PlainFit | null {
  const { vdd } = brief;
  const { vtTyp: vt, kTyp: k, lambda } = part;
  const rin = (r1 * r2) / (r1 + r2);
  if (rin < (brief.inputResistanceMin ?? 0)) return null;
  const vg = (vdd * r2) / (r1 + r2);
  if (vg <= vt) return null;
  const id = halve((i) => saturated(k, lambda, vg - i * rs, vt, vdd - i * (rd + rs)) - i, 0, vdd / (rd + rs));
  const vgs = vg - id * rs;
  const vds = vdd - id * (rd + rs);
  if (vds < vgs - vt) return null;
  const load = brief.load === null ? rd : 1 / (1 / rd + 1 / brief.load);
  const degeneration = brief.sourceResistor === "unbypassed" ? rs : 0;
  const slope = load + degeneration;
  const vTransition = halve((v) => id + (vds - v) / slope - k * v * v * (1 + lambda * v), 0, vds);
  const iTransition = k * vTransition * vTransition * (1 + lambda * vTransition);
  const up = id * load;
  const down = (iTransition - id) * load;
  const swing = Math.min(up, down);
  if (swing < (brief.swingPeak ?? 0)) return null;
  const supply = id + vdd / (r1 + r2);
  if (supply > (brief.supplyCurrentMax ?? Number.POSITIVE_INFINITY)) return null;
  if (id * rs < (brief.sourceDropMin ?? 0)) return null;
  const cooling =
    brief.ambientMax <= 25 ? 1 : Math.max(0, (part.tjMax - brief.ambientMax) / (part.tjMax - 25));
  if (id * vds > brief.deratingPower * part.pd25 * cooling) return null;
  const heats = [(vdd - vg) ** 2 / r1, vg ** 2 / r2, id * id * rd, id * id * rs];
  if (heats.some((heat) => heat > brief.resistorPower)) return null;
  const gm = 2 * Math.sqrt(k * id * (1 + lambda * vds));
  const gds = (lambda * id) / (1 + lambda * vds);
  const small = { gm, gds, load, rs: degeneration, rsig: brief.sourceImpedance, rin };
  const gain = (gm * load) / (1 + gm * degeneration + gds * (load + degeneration));
  if (gain < (brief.gainMin ?? 0) || gain > (brief.gainMax ?? Number.POSITIVE_INFINITY)) return null;
  if (brief.distortionMax !== undefined && brief.distortionPeak) {
    const hd2 = secondHarmonic(part, { id, vgs, vds }, load, degeneration, brief.distortionPeak / gain);
    if (!(hd2 <= brief.distortionMax)) return null;
  }
  if (brief.highCornerMin !== undefined && !staysUp(part, small, brief.highCornerMin)) return null;
  return {
    partId: part.id,
    r1,
    r2,
    rd,
    rs,
    bucket: Math.floor((100 * Math.abs(up - down)) / (up + down)),
    nanovolts: Math.round(swing * 1e9),
    supply,
  };
}

/** All fits of a brief in ranked order, by trying every combination. */
export function tryEveryCombination(brief: PlainBrief, parts: readonly PlainPart[]): PlainFit[] {
  const fits: PlainFit[] = [];
  const sources = brief.sourceResistor === "none" ? [0] : brief.source;
  for (const part of parts) {
    if (brief.vdd > brief.deratingVds * part.vdss) continue;
    for (const r1 of brief.divider) {
      for (const r2 of brief.divider) {
        for (const rd of brief.drain) {
          for (const rs of sources) {
            const fit = tryCombination(brief, part, r1, r2, rd, rs);
            if (fit) fits.push(fit);
          }
        }
      }
    }
  }
  const number = new Map(parts.map((part) => [part.id, part.partNumber]));
  const name = (fit: PlainFit) => number.get(fit.partId) ?? "";
  return fits.sort(
    (a, b) =>
      a.bucket - b.bucket ||
      b.nanovolts - a.nanovolts ||
      (Math.abs(a.supply - b.supply) > 1e-12 * a.supply ? a.supply - b.supply : 0) ||
      (name(a) < name(b) ? -1 : name(a) > name(b) ? 1 : 0) ||
      a.r1 - b.r1 ||
      a.r2 - b.r2 ||
      a.rd - b.rd ||
      a.rs - b.rs,
  );
}
