import type { MethodSection } from "../section";

export const DEVICE: MethodSection = {
  id: "device",
  title: "The device",
  opening:
    "The MOSFET follows the long-channel square law, with its body tied to its source. `V_T` is the threshold voltage, `K` the conduction parameter in A/V² (a level-1 simulator's KP is `2K` at `W = L`) and `λ` the channel-length modulation. A P-channel stage is worked out as its N-channel mirror, so every voltage and current here is a magnitude.",
  entries: [
    {
      id: "saturation-current",
      title: "Drain current in saturation",
      formulas: ["I_D = K (V_{GS} − V_T)^2 (1 + λ V_{DS})"],
      words: "Holds where the drain-source voltage is at least the overdrive, `V_{DS} ≥ V_{GS} − V_T`.",
      source:
        "H. Shichman and D. A. Hodges, “Modeling and simulation of insulated-gate field-effect transistor switching circuits”, IEEE Journal of Solid-State Circuits 3, 1968.",
      limits:
        "Long channels and strong inversion. Below an overdrive of about 0.1 V a real device leaves the square law (moderate inversion); a stage that does so carries a caution.",
    },
    {
      id: "ohmic-current",
      title: "Drain current in the ohmic region (non-saturation), and cutoff",
      formulas: ["I_D = K (2 (V_{GS} − V_T) V_{DS} − V_{DS}^2) (1 + λ V_{DS})", "I_D = 0  for  V_{GS} ≤ V_T"],
      words:
        "The ohmic law meets the saturation law at `V_{DS} = V_{GS} − V_T` without a step. Waves that reach either region are drawn and analysed with these laws, so they clip as they would.",
      source: "Shichman and Hodges 1968, as above.",
      limits: "Below threshold a real device still leaks; here it carries nothing.",
    },
    {
      id: "temperature",
      title: "Temperature",
      formulas: ["V_T(T) = V_{T,25} + TC (T − 25 °C)", "K(T) = K_{25} ({T + 273.15}/{298.15})^{−1.5}"],
      words:
        "`T` is the ambient temperature in °C and `TC` the part's threshold coefficient, usually −2 to −5 mV/K. The two work against each other: the threshold falls and lets more current through, the conduction parameter falls and lets less.",
      source:
        "The level-1 temperature law of Berkeley SPICE: threshold in a straight line, mobility by the power −1.5.",
      limits:
        "The device is taken at ambient temperature: its own heating moves the Q-point a little further the same way.",
    },
  ],
};
