import type { Capacitors } from "#shared/bias/low-corner";
import type { Device, StageValues } from "#shared/schemas/bias";

/** The mark of a P-channel stage, which is drawn with every voltage turned over. */
export const signOf = (device: Device) => (device.polarity === "n" ? 1 : -1);

/**
 * A stage's resistors, rails and device as a netlist. Nodes: `g` gate, `d` drain, `s` source terminal, `b` between
 * the part of the source resistor that carries signal and what a bypass capacitor shorts, `o` the output's terminal;
 * the load stands behind the output capacitor, from `l` to ground. KP of a level-1 model is 2K at W = L.
 *
 * @param tag ends every name
 */
export function drawNetlist(device: Device, stage: StageValues, tag: string): string[] {
  const sign = signOf(device);
  const { circuit, vdd, vss, r1, r2, rg, rd, rl } = stage;
  const resistor = (name: string, from: string, to: string, ohms: number) =>
    ohms > 0 ? [`r${name}${tag} ${from} ${to} ${ohms}`] : [];
  const [g, d, s, b, l, rail, negative] = ["g", "d", "s", "b", "l", "vdd", "vss"].map((node) => node + tag);
  const bottom = circuit === "negative-rail" ? negative : "0";
  const wire = (name: string, from: string, to: string) => [`v${name}${tag} ${from} ${to} 0`];
  const { signal, bypassed } = sourceResistorsOf(stage);
  return [
    `v${rail} ${rail} 0 ${sign * vdd}`,
    ...(circuit === "negative-rail" ? [`v${negative} ${negative} 0 ${-sign * vss}`] : []),
    ...resistor("1", rail, g, r1),
    ...resistor("2", g, "0", r2),
    ...resistor("g", g, circuit === "drain-feedback" ? d : "0", rg),
    ...(rd > 0 ? resistor("d", rail, d, rd) : wire("d", rail, d)),
    ...(signal > 0 ? resistor("s", s, b, signal) : wire("s", s, b)),
    ...(bypassed > 0 ? resistor("b", b, bottom, bypassed) : wire("b", b, bottom)),
    ...(rl === null ? [] : resistor("l", l, "0", rl)),
    // Drain current is read off this source of no voltage.
    `vm${tag} ${d} dm${tag} 0`,
    `m${tag} dm${tag} ${g} ${s} ${s} model${tag} w=1u l=1u`,
    `.model model${tag} ${device.polarity}mos level=1 vto=${sign * device.vt} kp=${2 * device.k} lambda=${device.lambda} is=1e-30`,
  ];
}

/** The terminal that a stage's output is taken from, ahead of the output capacitor. */
export const terminalOf = (stage: StageValues) => (stage.circuit === "follower" ? "s" : "d");

/** The node that the output voltage stands at: behind the output capacitor where there is a load. */
export const outputOf = (stage: StageValues) => (stage.rl === null ? terminalOf(stage) : "l");

/** The part of the source resistor that carries signal, and what a bypass capacitor shorts below it, ohms. */
function sourceResistorsOf({ circuit, rs, rs2, sourceBypassed }: StageValues) {
  if (circuit === "split-source") return { signal: rs, bypassed: rs2 };
  return sourceBypassed && circuit !== "follower" ? { signal: 0, bypassed: rs } : { signal: rs, bypassed: 0 };
}

/**
 * A signal source of 1 V at small signals, its impedance, and a stage's capacitors: the stage as it is built.
 *
 * @param tag that of the stage
 * @param ohms source impedance; 0 for none
 */
export function drawCoupling(
  stage: StageValues,
  tag: string,
  ohms: number,
  capacitors: Capacitors,
): string[] {
  const { input, output, bypass } = capacitors;
  return [
    `vin${tag} in${tag} 0 dc 0 ac 1`,
    ohms > 0 ? `rin${tag} in${tag} i${tag} ${ohms}` : `vi${tag} in${tag} i${tag} 0`,
    `ci${tag} i${tag} g${tag} ${input}`,
    ...(output === null ? [] : [`co${tag} ${terminalOf(stage)}${tag} l${tag} ${output}`]),
    ...(bypass === null ? [] : [`cb${tag} b${tag} 0 ${bypass}`]),
  ];
}

/** Which capacitors a stage has, all of one value. */
export function everyCapacitor(stage: StageValues, farads: number): Capacitors {
  return {
    input: farads,
    output: stage.rl === null ? null : farads,
    bypass: sourceResistorsOf(stage).bypassed > 0 ? farads : null,
  };
}

/**
 * A stage at rest and its twin under signal, where sources of direct voltage stand in for the capacitors: each holds
 * what the stage at rest has across it, so that a sweep meets the stage as a signal of mid-band does.
 *
 * @param signal the input's voltage above rest, as an expression of ngspice
 * @param ohms source impedance; 0 for none
 */
export function drawHeld(
  device: Device,
  stage: StageValues,
  tag: string,
  signal: string,
  ohms = 0,
): string[] {
  const still = `r${tag}`;
  const terminal = terminalOf(stage);
  return [
    ...drawNetlist(device, stage, still),
    ...drawNetlist(device, stage, tag),
    `bi${tag} i${tag} 0 v=v(g${still})+${signOf(device)}*(${signal})`,
    ohms > 0 ? `rin${tag} i${tag} g${tag} ${ohms}` : `vi${tag} i${tag} g${tag} 0`,
    ...(stage.rl === null ? [] : [`eo${tag} ${terminal}${tag} l${tag} ${terminal}${still} 0 1`]),
    ...(sourceResistorsOf(stage).bypassed > 0 ? [`eb${tag} b${tag} 0 b${still} 0 1`] : []),
  ];
}
