import type { MethodSection } from "../section";

const KIRCHHOFF = "Kirchhoff's laws for the circuit; nodal analysis of the small-signal circuit.";

export const CIRCUITS: MethodSection = {
  id: "circuits",
  title: "Circuits",
  opening:
    "A brief names its circuit. The formulas above are those of the four-resistor common-source stage; here is what differs in the others. Each comes down to two straight lines for direct current, `V_{GS}` and `V_{DS}` against `I_D`, and two for a signal, so the Q-point, the transition point, the room each way and the spread are worked out alike for all of them.",
  entries: [
    {
      id: "circuit-four-resistor",
      title: "Four-resistor common source",
      formulas: [
        "V_{GS} = V_{DD} {R_2}/{R_1 + R_2} − I_D R_S",
        "V_{DS} = V_{DD} − I_D (R_D + R_S)",
        "r_L = R_D || R_L",
      ],
      words:
        "A divider holds the gate, `R_D` stands at the drain, where the output is, `R_S` at the source. `R_S` is bypassed, not bypassed, or left out.",
      source: KIRCHHOFF,
      limits: "Without `R_S` the whole spread of the threshold reaches the drain current.",
    },
    {
      id: "circuit-split-source",
      title: "Common source, split source resistor",
      formulas: [
        "V_{GS} = V_{DD} {R_2}/{R_1 + R_2} − I_D (R_S + R_{S2})",
        "V_{DS} = V_{DD} − I_D (R_D + R_S + R_{S2})",
        "A_v = − {g_m r_L}/{1 + g_{ds} (r_L + R_S) + g_m R_S}",
      ],
      words:
        "For direct current both source resistors act as one; the lower one is bypassed, so that a signal meets `R_S` alone. `R_S` sets the gain and the distortion, the sum holds the Q-point.",
      source: KIRCHHOFF,
      limits: "A least drop across the source resistors is that of their sum.",
    },
    {
      id: "circuit-follower",
      title: "Source follower",
      formulas: [
        "V_{GS} = V_{DD} {R_2}/{R_1 + R_2} − I_D R_S",
        "V_{DS} = V_{DD} − I_D R_S",
        "r_L = r_S = R_S || R_L",
        "A_v = {g_m r_L}/{1 + (g_m + g_{ds}) r_L},  R_{out} = {1}/{1/R_S + g_m + g_{ds}}",
      ],
      words:
        "The drain stands at the rail and the output is at the source: it follows the input, with a gain below 1. Toward cutoff the output falls by `U = I_{DQ} r_L` at most; toward the ohmic region it rises by `D = V_{DSQ} − v_T`.",
      source: KIRCHHOFF,
      limits:
        "The input must swing as far as the output and more. `R_S` carries the signal, so there is nothing to bypass.",
    },
    {
      id: "circuit-drain-feedback",
      title: "Drain feedback",
      formulas: [
        "V_D = {R_G + R_2}/{R_G + R_2 + R_D} (V_{DD} − I_D R_D),  V_G = V_D {R_2}/{R_G + R_2}",
        "V_{GS} = V_G − I_D R_S,  V_{DS} = V_D − I_D R_S",
        "r_L = R_D || R_L || R_G",
        "A_v = {r_L}/{R_G} − r_L {g_m + g_{ds} r_L / R_G}/{1 + g_{ds} (r_L + R_S) + g_m R_S}",
        "R_{in} = {1}/{(1 − A_v)/R_G + 1/R_2}",
      ],
      words:
        "`R_G` feeds the drain voltage back to the gate, which holds the Q-point against the spread; `R_2` takes part of it to ground. Without `R_2`, `V_G = V_D` and its terms drop out. For a signal `R_G` loads the output and passes some of the input past the device, so both rooms are counted with that share in.",
      source: `${KIRCHHOFF} \`R_{in}\` is Miller's effect.`,
      limits:
        "Gain and input resistance are those for a source that holds the gate: its own impedance lets `R_G` lower the gain.",
    },
    {
      id: "circuit-negative-rail",
      title: "Common source, gate at ground",
      formulas: [
        "V_{GS} = V_{SS} − I_D R_S",
        "V_{DS} = V_{DD} + V_{SS} − I_D (R_D + R_S)",
        "R_{in} = R_G,  I_{DD} = I_{DQ}",
      ],
      words:
        "`R_G` ties the gate to ground and `R_S` runs to a negative rail of magnitude `V_{SS}`, as large as the positive one unless the brief says otherwise. No divider spends current, and `R_S` may drop much, which holds the Q-point well.",
      source: KIRCHHOFF,
      limits:
        "Each rail strays by the brief's tolerance on its own. Gate leakage through `R_G` is neglected.",
    },
  ],
};
