import type { MethodSection } from "../section";

export const SWING: MethodSection = {
  id: "swing",
  title: "Load lines and swing",
  opening:
    "For direct current the drain works against `R_D + R_S`. For a signal it works against the load as well, so the signal moves along a steeper line through the Q-point. How far it can move each way is what the product ranks by.",
  entries: [
    {
      id: "load-lines",
      title: "The a.c. load line",
      formulas: ["r_L = {R_D R_L}/{R_D + R_L}", "i_D = I_{DQ} − {v_{DS} − V_{DSQ}}/{r_S}"],
      words:
        "`r_S` is the slope resistance: `r_L` where the source resistor is bypassed, `r_L + R_S` where it is not. Without a load `r_L = R_D`.",
      source: "Common practice; derived from the small-signal circuit with its capacitors as shorts.",
      limits: "Holds between the low and the high corner.",
    },
    {
      id: "transition-point",
      title: "Transition point",
      formulas: ["K v_T^2 (1 + λ v_T) = I_{DQ} + {V_{DSQ} − v_T}/{r_S}", "i_T = K v_T^2 (1 + λ v_T)"],
      words:
        "Where the a.c. line meets the edge of saturation, `v_{DS} = v_{GS} − V_T`. Beyond it the device is in the ohmic region and the wave flattens.",
      source: "Derived from the saturation law and the a.c. line.",
    },
    {
      id: "room",
      title: "Room each way, and symmetric swing",
      formulas: ["U = I_{DQ} r_L", "D = (i_T − I_{DQ}) r_L", "S = min(U, D)"],
      words:
        "Peak volts at the output: `U` toward cutoff, `D` toward the ohmic region. The smaller is the symmetric swing `S`. The balance bar draws the two, with the Q-point between them.",
      source: "Derived from the a.c. line's two ends.",
      limits:
        "These are the edges of clipping. Distortion may set a smaller limit: see the largest swing at a distortion limit.",
    },
    {
      id: "centring-error",
      title: "Centring error",
      formulas: ["c = {|U − D|}/{U + D}"],
      words:
        "How far off centre the Q-point is: 0 at dead centre, 1 at an edge. Shown as a percentage, “off centre”.",
      source: "Definition.",
    },
    {
      id: "spread",
      title: "Where the Q-point may land",
      formulas: [],
      words:
        "The hatched patch of the load-line figure is the outline of the Q-points of the builds at every corner of the spread: threshold and conduction parameter at both ends of the datasheet range, each resistor and the rail at both ends of its tolerance, at the lowest and the highest ambient temperature of the brief.",
      source: "Each build is solved like the stage itself.",
      limits:
        "It joins the corners of the spread. A build inside the ranges may land a little outside an edge between two corners.",
    },
  ],
};
