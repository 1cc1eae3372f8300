import type { StageValues } from "#shared/schemas/bias";
import type { Resistors } from "#shared/schemas/circuit";

/** Resistors of a circuit; those not named it doesn't have. */
export function buildResistors(resistors: Partial<Resistors>): Resistors {
  return { r1: 0, r2: 0, rg: 0, rd: 0, rs: 0, rs2: 0, ...resistors };
}

/** A four-resistor stage without load unless told otherwise. */
export function buildStageValues(values: Partial<StageValues>): StageValues {
  return {
    circuit: "four-resistor",
    vdd: 12,
    vss: 0,
    ...buildResistors({}),
    rl: null,
    sourceBypassed: true,
    ...values,
  };
}
