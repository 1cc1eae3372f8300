import type { MethodSection } from "../section";

const NODES = "Nodal analysis of the small-signal circuit; no term is dropped.";

export const SIGNAL: MethodSection = {
  id: "signal",
  title: "Small signals",
  opening:
    "Between its corners the stage is its small-signal circuit at the Q-point. `R_S` in these formulas is the part that carries signal: 0 where it is bypassed.",
  entries: [
    {
      id: "gm",
      title: "Transconductance",
      formulas: ["g_m = 2 √{K I_D (1 + λ V_{DS})} = 2 K V_{OV} (1 + λ V_{DS})"],
      words: "How much the drain current follows the gate.",
      source: "Derivative of the saturation law by `V_{GS}`.",
    },
    {
      id: "ro",
      title: "Output slope resistance of the device",
      formulas: ["r_o = {1 + λ V_{DSQ}}/{λ I_{DQ}} = {1}/{g_{ds}}"],
      words:
        "How little the drain current follows the drain. Without channel-length modulation it is infinite.",
      source: "Derivative of the saturation law by `V_{DS}`.",
    },
    {
      id: "gain",
      title: "Gain",
      formulas: ["A_v = − {g_m r_L}/{1 + g_{ds} (r_L + R_S) + g_m R_S}"],
      words:
        "From gate to output; negative because the stage inverts. Bypassed, this is `−g_m (r_L || r_o)`.",
      source: NODES,
      limits: "From the gate: a source impedance and the divider take their share before it.",
    },
    {
      id: "input-resistance",
      title: "Input resistance",
      formulas: ["R_{in} = {R_1 R_2}/{R_1 + R_2}"],
      words: "The two resistors of the divider, in parallel to a signal.",
      source: NODES,
    },
    {
      id: "output-resistance",
      title: "Output resistance",
      formulas: ["R_{out} = R_D || (r_o + R_S + g_m r_o R_S)"],
      words:
        "What the load sees, looking back into the stage. Bypassed, the source resistor drops out and `R_D || r_o` is left.",
      source: NODES,
    },
    {
      id: "distortion",
      title: "Second and third harmonic",
      formulas: ["h_n = {a_n}/{a_1},  a_n = {2}/{π} ∫ v(θ) cos(n θ) d θ"],
      words:
        "For a sine at the gate the drain current is solved point by point along the a.c. line, with the whole device law, and the Fourier coefficients of the output are taken: 129 points over half a period, which is all there is to a curve without memory. The peak is the brief's output peak, or its swing.",
      source:
        "Fourier's definition. Checks: for `λ = 0` and small signals `h_2 = A / (4 V_{OV} (1 + g_m R_S)^2)`, `A` the input peak; bypassed, with `δ = λ r_L K V_{OV}^2`, `h_2 = (A / 4 V_{OV}) |1 − 3δ| / (1 + δ)`.",
      limits:
        "Static: the stage well between its corners. The input peak is the output peak over the small-signal gain. The square law knows no other source of distortion, so a real device adds some.",
    },
    {
      id: "linear-swing",
      title: "Largest swing at a distortion limit",
      formulas: ["S_h = max v  with  h_2(u) ≤ limit  for all  u ≤ v ≤ S"],
      words:
        "The largest output peak up to which the second harmonic stays within the brief's limit, and never more than the symmetric swing. The smaller of the two is what the stage is good for.",
      source: "Searched in 24 steps and closed in on at the first step that exceeds the limit.",
    },
  ],
};
