import type { MethodSection } from "../section";

const KIRCHHOFF = "Kirchhoff's laws for the circuit.";

export const Q_POINT: MethodSection = {
  id: "q-point",
  title: "The Q-point",
  opening:
    "These are the formulas of the four-resistor common-source stage; the other circuits follow under Circuits. `R_1` runs from the rail to the gate, `R_2` from the gate to ground, `R_D` from the rail to the drain, `R_S` from the source to ground (it may be a wire), bypassed or not. A load `R_L` follows through a capacitor, or there is none.",
  entries: [
    {
      id: "gate-voltage",
      title: "Gate voltage",
      formulas: ["V_G = V_{DD} {R_2}/{R_1 + R_2}"],
      words: "The gate takes no current, so the divider is not loaded.",
      source: KIRCHHOFF,
      limits: "Gate leakage is neglected; with dividers of many megohms, check it against the datasheet.",
    },
    {
      id: "gate-source-voltage",
      title: "Gate-source voltage",
      formulas: ["V_{GS} = V_G − I_D R_S"],
      words:
        "The source resistor takes part of the gate voltage. The more it takes, the less the current follows the threshold.",
      source: KIRCHHOFF,
    },
    {
      id: "drain-current",
      title: "Drain current",
      formulas: ["x + R_S {K (1 + λ V_{DD}) x^2}/{1 + λ K (R_D + R_S) x^2} = V_G − V_T"],
      words:
        "Device and circuit together give one equation for the overdrive `x = V_{GS} − V_T`; the fraction is the drain current `I_{DQ}`. Its left side only rises, so there is one root, found to the last digit by a bracketed Newton search; for `λ = 0` it is that of the quadratic with `V_{GS}` above `V_T`. If the answer has `V_{DS} < x`, the stage is in the ohmic region and is solved there.",
      source: "Derived from the saturation law and the two loops of the circuit.",
    },
    {
      id: "overdrive",
      title: "Overdrive voltage",
      formulas: ["V_{OV} = V_{GS} − V_T"],
      words: "How far the gate is above threshold. It sets gain against distortion and headroom.",
      source: "Definition.",
    },
    {
      id: "drain-source-voltage",
      title: "Drain-source voltage",
      formulas: ["V_{DS} = V_{DD} − I_D (R_D + R_S)"],
      words: "What the resistors leave of the rail for the device.",
      source: KIRCHHOFF,
    },
    {
      id: "supply-current",
      title: "Supply current",
      formulas: ["I_{DD} = I_{DQ} + {V_{DD}}/{R_1 + R_2}"],
      words: "What the whole stage takes from the rail: drain and divider.",
      source: KIRCHHOFF,
    },
  ],
};
