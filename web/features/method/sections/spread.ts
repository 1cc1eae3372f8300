import type { MethodSection } from "../section";

export const SPREAD: MethodSection = {
  id: "spread-and-yield",
  title: "Spread and yield",
  opening:
    "No two boards are alike: threshold and conduction parameter lie anywhere in the datasheet's range, resistors and rails anywhere in their tolerance, the ambient temperature anywhere in the brief's range. Two figures say what that does to a stage: what every build still has, and how many builds meet the brief.",
  entries: [
    {
      id: "assured-swing",
      title: "Assured swing",
      formulas: ["S_{assured} = min(U_{least}, D_{least})"],
      words:
        "The least room each way over all builds whose values lie in their ranges: a guarantee, not a likelihood. It is 0 where some build doesn't conduct or leaves saturation. The least room toward cutoff is that of the highest threshold with the least conduction parameter and rail, toward the ohmic region that of the lowest threshold; what may lie at either end of its range is tried at both. The balance bar draws it darker.",
      source:
        "Derived for each circuit from how the room depends on one value at a time. Tested against 20,000 simulated builds of each of 200 stages a circuit: none had less.",
      limits:
        "That the least lies at these ends is proved for the four-resistor and the split-source stage with `λ = 0`; elsewhere it is tested, not proved. The load and the capacitors are taken as they are.",
    },
    {
      id: "worst-temperature",
      title: "The worst temperature",
      formulas: ["x = {4}/{3} |{dV_T}/{dT}| T"],
      words:
        "Threshold and conduction parameter both fall as the device warms up, one raising the drain current, the other lowering it. At the overdrive `x`, `T` in kelvin, the current is least, so the least room toward cutoff may lie inside the ambient range. It is solved for there as well as at both ends.",
      source: "Derived from the temperature laws of the device.",
    },
    {
      id: "yield",
      title: "Yield",
      formulas: ["Y = {n_{pass}}/{n}"],
      words:
        "The share of simulated builds that meet every condition of the brief: swing, gain, input resistance, supply current, source drop, high corner, distortion, and the derated ratings at the build's own temperature. `V_T` and `K` are drawn from a normal distribution around the middle of their range whose 3 sigma are its ends, cut off there; with a lot attached, from the lot's own readings in pairs. Resistors, rails and ambient temperature are drawn evenly from their ranges. The same seed draws the same builds.",
      source:
        "Monte Carlo simulation; xoshiro128** (D. Blackman and S. Vigna, ACM Transactions on Mathematical Software 47, 2021) and the ziggurat (G. Marsaglia and W. W. Tsang, Journal of Statistical Software 5, 2000).",
      limits:
        "Parts of one delivery are more alike than the datasheet's range, and lots differ: a yield speaks for the distribution stated, not for a batch. `V_T` and `K` are drawn apart from each other unless a lot says how they go together.",
    },
    {
      id: "yield-interval",
      title: "The yield's 95 % interval",
      formulas: ["{Y + z^2 / (2 n) ± z √{Y (1 − Y) / n + z^2 / (4 n^2)}}/{1 + z^2 / n}"],
      words:
        "A share of `n` builds is known only so well: in 95 of 100 simulations the true share lies inside this interval, with `z = 1.96`. 10,000 builds give ± 1 % at worst, less near 100 %.",
      source:
        "E. B. Wilson, “Probable inference, the law of succession, and statistical inference”, Journal of the American Statistical Association 22, 1927.",
    },
    {
      id: "costliest-parameter",
      title: "What costs the most yield",
      formulas: [],
      words:
        "The same builds are judged again with one of threshold, conduction parameter, rail, resistors and ambient temperature held at its typical or nominal value, each in turn. The one that raises the yield most is the one to narrow first: by sorting parts, a better rail or closer resistors.",
      source: "Definition; common random numbers, so that no luck decides between them.",
      limits:
        "It is one parameter at a time. The ambient temperature is held at 25 °C, or the nearest end of its range.",
    },
  ],
};
