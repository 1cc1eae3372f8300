import { solveStage } from "#shared/bias/solve-stage";
import { stageValues } from "#shared/bias/stage-sheet";
import type { Device, StageValues } from "#shared/schemas/bias";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import type { CircuitName, Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { buildPart } from "../support/build-part";
import { buildResistors } from "../support/build-stage";
import { type Random, significant } from "../support/random";

/** A stage drawn at random, as a brief and resistors describe it and as the engine takes it. */
export type DrawnStage = {
  name: string;
  part: Part;
  brief: Brief;
  resistors: Resistors;
  device: Device;
  stage: StageValues;
};

type Kind = {
  name: string;
  circuit: CircuitName;
  sourceResistors: readonly Brief["sourceResistor"][];
  withR2?: boolean;
};

/** Every circuit, and drain feedback both ways, with the treatments of the source resistor it allows. */
const KINDS: readonly Kind[] = [
  { name: "four-resistor", circuit: "four-resistor", sourceResistors: ["bypassed", "unbypassed", "none"] },
  { name: "split-source", circuit: "split-source", sourceResistors: ["bypassed"] },
  { name: "follower", circuit: "follower", sourceResistors: ["unbypassed"] },
  {
    name: "drain-feedback with R2",
    circuit: "drain-feedback",
    sourceResistors: ["bypassed", "unbypassed", "none"],
    withR2: true,
  },
  {
    name: "drain-feedback without R2",
    circuit: "drain-feedback",
    sourceResistors: ["bypassed", "unbypassed", "none"],
    withR2: false,
  },
  { name: "negative-rail", circuit: "negative-rail", sourceResistors: ["bypassed", "unbypassed"] },
];

/**
 * Stages of every circuit, both polarities and every treatment of the source resistor in turn. Each is drawn from its
 * operating point outward: threshold (below zero too, where the circuit can bias such a part), overdrive and
 * drain-source voltage first, then the resistors that bring them about, rounded to three figures.
 *
 * @param each how many of each circuit
 * @param room the least and greatest VDS over the overdrive; below 1 the stage is ohmic
 */
export function drawStages(random: Random, each: number, room: readonly [number, number]): DrawnStage[] {
  return KINDS.flatMap((kind) =>
    Array.from({ length: each }, (_, n) => {
      const polarity = n % 2 === 0 ? "n" : "p";
      const sourceResistor = kind.sourceResistors[(n >> 1) % kind.sourceResistors.length];
      for (;;) {
        const drawn = drawStage(random, kind, polarity, sourceResistor, room);
        if (drawn && (room[0] < 1 || amplifies(drawn)))
          return { ...drawn, name: `${kind.name} ${n}, ${polarity}-channel, ${sourceResistor}` };
      }
    }),
  );
}

/** Whether rounding left a stage in saturation, with more of the signal through its device than past it. */
function amplifies({ device, stage }: Omit<DrawnStage, "name">): boolean {
  const { region, vds, overdrive, gm } = solveStage(device, stage);
  const degenerated = gm / (1 + (stage.sourceBypassed ? 0 : gm * stage.rs));
  const passesLittle = stage.circuit !== "drain-feedback" || degenerated * stage.rg > 3;
  return region === "saturation" && vds > 1.1 * overdrive && passesLittle;
}

/** One stage, or null where the figures drawn don't go together. */
function drawStage(
  random: Random,
  kind: Kind,
  polarity: Part["polarity"],
  sourceResistor: Brief["sourceResistor"],
  room: readonly [number, number],
): Omit<DrawnStage, "name"> | null {
  const vt = significant(random.chance(0.3) ? random.between(-4, -0.3) : random.between(0.4, 4));
  const k = significant(random.logBetween(1e-4, 0.2));
  const lambda = random.chance(0.4) ? 0 : significant(random.between(0.002, 0.05));
  const x = random.logBetween(0.15, 2.5);
  const withoutR2 = kind.withR2 === false;
  const across = withoutR2
    ? vt + x
    : x * random.between(...room) + (kind.circuit === "follower" ? Math.max(0, vt) : 0);
  if (across < room[0] * x || across > room[1] * x + 4) return null;
  const vds = across;
  const id = k * x * x * (vds < x ? (2 - vds / x) * (vds / x) : 1) * (1 + lambda * vds);
  const ontoSource = sourceResistor === "none" ? 0 : random.logBetween(0.3, 8);
  const ontoDrain = random.logBetween(0.5, 12);
  const gate = vt + x + ontoSource;
  const resistors = buildResistors({});
  let volts = vds + ontoSource + ontoDrain;
  let negative: number | undefined;
  const rs = significant(ontoSource / id);
  if (kind.circuit === "drain-feedback") {
    const drain = vds + ontoSource;
    const total = (drain / id) * random.logBetween(0.5, 1000);
    const r2 = withoutR2 ? 0 : (total * gate) / drain;
    if (!withoutR2 && !(r2 > 0.01 * total && r2 < 0.97 * total)) return null;
    resistors.r2 = significant(r2);
    resistors.rg = significant(total - r2);
    resistors.rd = significant(ontoDrain / (id + (withoutR2 ? 0 : drain / total)));
    resistors.rs = rs;
    volts = drain + ontoDrain;
  } else if (kind.circuit === "negative-rail") {
    negative = significant(gate);
    volts = vds + ontoDrain - (vt + x);
    resistors.rg = significant(random.logBetween(1e4, 1e7));
    resistors.rd = significant(ontoDrain / id);
    resistors.rs = rs;
  } else {
    if (kind.circuit === "follower") volts = vds + ontoSource;
    if (gate < 0.02 * volts || gate > 0.98 * volts) return null;
    const total = random.logBetween(2e4, 5e6);
    resistors.r2 = significant((total * gate) / volts);
    resistors.r1 = significant(total - resistors.r2);
    if (kind.circuit !== "follower") resistors.rd = significant(ontoDrain / id);
    const share = kind.circuit === "split-source" ? random.between(0.05, 0.7) : 1;
    resistors.rs = significant(rs * share);
    if (kind.circuit === "split-source") resistors.rs2 = significant(rs - resistors.rs);
  }
  const loaded = kind.circuit === "follower" ? resistors.rs : resistors.rd;
  const load = random.chance(0.3) ? null : significant(loaded * random.logBetween(0.3, 10));
  const least = Math.min(...Object.values(resistors).filter((ohms) => ohms > 0), load ?? 1);
  if (volts < 1 || volts > 60 || (negative ?? 1) < 0.5 || least < 0.1) return null;
  const ciss = significant(random.logBetween(10e-12, 300e-12));
  const crss = significant(ciss * random.between(0.05, 0.4));
  const part = buildPart({
    polarity,
    vtTyp: vt,
    vtMin: vt,
    vtMax: vt,
    kTyp: k,
    kMin: k,
    kMax: k,
    lambda,
    ciss,
    crss,
    coss: significant(crss * random.between(1.1, 4)),
  });
  const brief = briefSchema.parse({
    circuit: kind.circuit,
    polarity,
    rail: { volts: significant(volts), negative },
    load: { ohms: load },
    source: { ohms: random.chance(0.2) ? 0 : significant(random.logBetween(50, 1e5)) },
    lowCorner: { hertz: significant(random.logBetween(3, 3000)) },
    sourceResistor,
  });
  const device = { polarity, vt, k, lambda };
  return { part, brief, resistors, device, stage: stageValues(brief, resistors) };
}
