import {
  degeneration,
  halve,
  type PlainCircuit,
  type PlainPoint,
  type PlainStage,
  plainAssured,
  plainPoint,
  signalVoltages,
} from "./plain-stage";

/**
 * Every combination, tried in turn: the ranking as its definition reads, written apart from the engine and sharing no
 * code with it. Each root is found by halving, each circuit solved by elimination; slow and plain on purpose.
 */

export type PlainPart = {
  id: number;
  partNumber: string;
  polarity: "n" | "p";
  vtMin: number;
  vtTyp: number;
  vtMax: number;
  kMin: number;
  kTyp: number;
  kMax: number;
  lambda: number;
  tcVt: number;
  ciss: number;
  coss: number;
  crss: number;
  vdss: number;
  pd25: number;
  tjMax: number;
  priceBreaks: { quantity: number; unitPrice: number }[];
};

export type PlainResistor = "r1" | "r2" | "rg" | "rd" | "rs" | "rs2";

/** The brief's conditions, flat; a limit left out does not bind. */
export type PlainBrief = {
  circuit: PlainCircuit;
  objective: "centred" | "assured" | "cost";
  vdd: number;
  vss: number;
  load: number | null;
  sourceImpedance: number;
  bypassed: boolean;
  /** Values of each resistor that the circuit has. */
  values: Partial<Record<PlainResistor, number[]>>;
  resistorTolerance: number;
  railTolerance: number;
  ambient: [number, number];
  swingPeak?: number;
  gainMin?: number;
  gainMax?: number;
  inputResistanceMin?: number;
  supplyCurrentMax?: number;
  sourceDropMin?: number;
  highCornerMin?: number;
  distortionMax?: number;
  distortionPeak?: number;
  deratingVds: number;
  deratingPower: number;
  /** What each resistor may dissipate, W. */
  resistorPower: number;
  /** Integer cents of a part for the whole build, and of a resistor (ohms, watts, volts); null where none is sold. */
  partCents?: (part: PlainPart) => number | null;
  resistorCents?: (ohms: number, watts: number, volts: number) => number | null;
};

export type PlainFit = Record<PlainResistor, number> & {
  partId: number;
  bucket: number;
  /** Assured swing. */
  nanovolts: number;
  cents: number;
  supply: number;
};

const current = (part: PlainPart, vgs: number, vds: number) => {
  const over = vgs - part.vtTyp;
  if (over <= 0) return 0;
  if (vds >= over) return part.kTyp * over * over * (1 + part.lambda * vds);
  return part.kTyp * (2 * over * vds - vds * vds) * (1 + part.lambda * vds);
};

/** Second harmonic over the fundamental of the output voltage for a sine at the gate. */
function secondHarmonic(part: PlainPart, stage: PlainStage, q: PlainPoint, peak: number): number {
  const samples = 64;
  let sin1 = 0;
  let cos2 = 0;
  const fall = -signalVoltages(stage, 1, 0).vds;
  for (let n = 0; n < samples; n++) {
    const angle = (2 * Math.PI * n) / samples;
    const input = peak * Math.sin(angle);
    const balance = (i: number) => {
      const moved = signalVoltages(stage, i - q.id, input);
      return current(part, q.vgs + moved.vgs, q.vds + moved.vds) - i;
    };
    const i = halve(balance, 0, q.id + (q.vds + signalVoltages(stage, 0, input).vds) / fall);
    const { out } = signalVoltages(stage, i - q.id, input);
    sin1 += out * Math.sin(angle);
    cos2 += out * Math.cos(2 * angle);
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

type Small = {
  gm: number;
  gds: number;
  /** At the drain, at the source, at the gate, and from drain to gate, ohms. */
  drain: number;
  source: number;
  gate: number;
  feedback: number;
  rsig: number;
  output: "drain" | "source";
};

/** Magnitude from generator to output at a frequency: the admittance matrix of gate, drain and source, eliminated. */
function response(part: PlainPart, s: Small, hertz: number): number {
  const jw = (farads: number): Complex => [0, 2 * Math.PI * hertz * farads];
  const cgs = jw(part.ciss - part.crss);
  const cgd = add(jw(part.crss), [1 / s.feedback, 0]);
  const cds = jw(part.coss - part.crss);
  // A wire is a nano-ohm here, so that one matrix serves every case.
  const drive = 1 / Math.max(s.rsig, 1e-9);
  const matrix: Complex[][] = [
    [add([drive + 1 / s.gate, 0], add(cgs, cgd)), negative(cgd), negative(cgs), [drive, 0]],
    [
      add([s.gm, 0], negative(cgd)),
      add([1 / Math.max(s.drain, 1e-9) + s.gds, 0], add(cgd, cds)),
      add([-s.gm - s.gds, 0], negative(cds)),
      [0, 0],
    ],
    [
      add([-s.gm, 0], negative(cgs)),
      add([-s.gds, 0], negative(cds)),
      add([1 / Math.max(s.source, 1e-9) + s.gm + s.gds, 0], add(cgs, cds)),
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
  return s.output === "drain" ? Math.hypot(drain[0], drain[1]) : Math.hypot(source[0], source[1]);
}

/** Whether the gain stays within 3 dB of mid-band from 1 Hz up to a frequency. */
function staysUp(part: PlainPart, s: Small, hertz: number): boolean {
  const least = response(part, s, 0) / Math.SQRT2;
  for (let f = 1; f < hertz; f *= 1.05) if (response(part, s, f) < least) return false;
  return response(part, s, hertz) >= least;
}

/** Volts across each resistor and what the positive rail gives. */
function directFigures(
  s: PlainStage,
  id: number,
): { volts: Partial<Record<PlainResistor, number>>; supply: number } {
  if (s.circuit === "negative-rail") return { volts: { rg: 0, rd: id * s.rd, rs: id * s.rs }, supply: id };
  if (s.circuit === "drain-feedback") {
    const drain = s.r2 === 0 ? s.vdd - id * s.rd : (s.vdd / s.rd - id) / (1 / s.rd + 1 / (s.rg + s.r2));
    const through = s.r2 === 0 ? 0 : drain / (s.rg + s.r2);
    return {
      volts: { rg: through * s.rg, r2: through * s.r2, rd: s.vdd - drain, rs: id * s.rs },
      supply: (s.vdd - drain) / s.rd,
    };
  }
  const through = s.vdd / (s.r1 + s.r2);
  return {
    volts: { r1: through * s.r1, r2: through * s.r2, rd: id * s.rd, rs: id * s.rs, rs2: id * s.rs2 },
    supply: id + through,
  };
}

/** The gate's own resistance to ground, ohms. */
function gateResistance({ circuit, r1, r2, rg }: PlainStage): number {
  if (circuit === "negative-rail") return rg;
  if (circuit === "drain-feedback") return r2 === 0 ? Number.POSITIVE_INFINITY : r2;
  return (r1 * r2) / (r1 + r2);
}

function smallSignal(brief: PlainBrief, part: PlainPart, s: PlainStage, q: PlainPoint): Small {
  const beside = (r: number) => (s.load === null ? r : 1 / (1 / r + 1 / s.load));
  const follows = s.circuit === "follower";
  return {
    gm: 2 * Math.sqrt(part.kTyp * q.id * (1 + part.lambda * q.vds)),
    gds: (part.lambda * q.id) / (1 + part.lambda * q.vds),
    drain: follows ? 0 : beside(s.rd),
    source: follows ? beside(s.rs) : degeneration(s),
    gate: gateResistance(s),
    feedback: s.circuit === "drain-feedback" ? s.rg : Number.POSITIVE_INFINITY,
    rsig: brief.sourceImpedance,
    output: follows ? "source" : "drain",
  };
}

/** Solves one combination and checks every condition; null when one fails. */
function tryCombination(
  brief: PlainBrief,
  part: PlainPart,
  resistors: Record<PlainResistor, number>,
): PlainFit | null {
  const none = Number.POSITIVE_INFINITY;
  const { vdd, vss, load, bypassed, circuit } = brief;
  const stage: PlainStage = { circuit, vdd, vss, ...resistors, load, bypassed };
  const q = plainPoint({ vt: part.vtTyp, k: part.kTyp, lambda: part.lambda }, stage);
  if (!q) return null;
  const swing = Math.min(q.up, q.down);
  if (swing <= 0 || swing < (brief.swingPeak ?? 0)) return null;
  const { volts, supply } = directFigures(stage, q.id);
  if (supply > (brief.supplyCurrentMax ?? none)) return null;
  if (q.id * (stage.rs + stage.rs2) < (brief.sourceDropMin ?? 0)) return null;
  const hottest = brief.ambient[1];
  const cooling = hottest <= 25 ? 1 : Math.max(0, (part.tjMax - hottest) / (part.tjMax - 25));
  if (q.id * q.vds > brief.deratingPower * part.pd25 * cooling) return null;
  const across = Object.entries(volts).filter(([name]) => resistors[name as PlainResistor] > 0);
  const heat = ([name, v]: [string, number]) => v ** 2 / resistors[name as PlainResistor];
  if (across.some((entry) => heat(entry) > brief.resistorPower)) return null;
  const small = smallSignal(brief, part, stage, q);
  const gain = response({ ...part, ciss: 0, crss: 0, coss: 0 }, { ...small, rsig: 0 }, 0);
  if (gain < (brief.gainMin ?? 0) || gain > (brief.gainMax ?? none)) return null;
  // Where nothing is fed back the gate's own resistance is the input's, to the last bit.
  const fedBack = 1 / (1 / small.gate + (1 + gain) / small.feedback);
  const rin = small.feedback === none ? small.gate : fedBack;
  if (rin < (brief.inputResistanceMin ?? 0)) return null;
  if (brief.distortionMax !== undefined && brief.distortionPeak) {
    const hd2 = secondHarmonic(part, stage, q, brief.distortionPeak / gain);
    if (!(hd2 <= brief.distortionMax)) return null;
  }
  if (brief.highCornerMin !== undefined && !staysUp(part, small, brief.highCornerMin)) return null;
  const assured = plainAssured({
    vt: [part.vtMin, part.vtMax],
    k: [part.kMin, part.kMax],
    lambda: part.lambda,
    tcVt: part.tcVt,
    stage,
    resistors: brief.resistorTolerance,
    rail: brief.railTolerance,
    ambient: brief.ambient,
  });
  let cents = 0;
  if (brief.objective === "cost") {
    if (assured < (brief.swingPeak ?? 0)) return null;
    const lines = [
      brief.partCents?.(part) ?? null,
      ...across.map((entry) => {
        const [name, v] = entry;
        return brief.resistorCents?.(resistors[name as PlainResistor], heat(entry), v) ?? null;
      }),
    ];
    for (const line of lines) {
      if (line === null) return null;
      cents += line;
    }
  }
  return {
    partId: part.id,
    ...resistors,
    bucket: Math.floor((100 * Math.abs(q.up - q.down)) / (q.up + q.down)),
    nanovolts: Math.round(assured * 1e9),
    cents,
    supply,
  };
}

const NAMES = ["r1", "r2", "rg", "rd", "rs", "rs2"] as const;

/** Every choice of values, as a record of resistors. */
function everyChoice(values: PlainBrief["values"]): Record<PlainResistor, number>[] {
  let choices: Record<PlainResistor, number>[] = [{ r1: 0, r2: 0, rg: 0, rd: 0, rs: 0, rs2: 0 }];
  for (const name of NAMES) {
    const list = values[name];
    if (list) choices = choices.flatMap((choice) => list.map((value) => ({ ...choice, [name]: value })));
  }
  return choices;
}

/** All fits of a brief in ranked order, by trying every combination. */
export function tryEveryCombination(brief: PlainBrief, parts: readonly PlainPart[]): PlainFit[] {
  const fits: PlainFit[] = [];
  const choices = everyChoice(brief.values);
  for (const part of parts) {
    if (brief.vdd + brief.vss > brief.deratingVds * part.vdss) continue;
    for (const resistors of choices) {
      const fit = tryCombination(brief, part, resistors);
      if (fit) fits.push(fit);
    }
  }
  const number = new Map(parts.map((part) => [part.id, part.partNumber]));
  const name = (fit: PlainFit) => number.get(fit.partId) ?? "";
  const first = {
    centred: (a: PlainFit, b: PlainFit) => a.bucket - b.bucket || b.nanovolts - a.nanovolts,
    assured: (a: PlainFit, b: PlainFit) => b.nanovolts - a.nanovolts,
    cost: (a: PlainFit, b: PlainFit) => a.cents - b.cents,
  }[brief.objective];
  return fits.sort(
    (a, b) =>
      first(a, b) ||
      (Math.abs(a.supply - b.supply) > 1e-12 * a.supply ? a.supply - b.supply : 0) ||
      (name(a) < name(b) ? -1 : name(a) > name(b) ? 1 : 0) ||
      NAMES.reduce((order, key) => order || a[key] - b[key], 0),
  );
}
