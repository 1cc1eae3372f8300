import type { MethodSection } from "../section";

export const WHY: MethodSection = {
  id: "why",
  title: "What a stage answers to",
  opening:
    "A stage's sheet says which limit binds, what each component does to it, and which value would do better.",
  entries: [
    {
      id: "margin",
      title: "What a condition has to spare",
      formulas: ["m = {x − x_{limit}}/{x_{limit}}"],
      words:
        "How far a figure is from its limit, as a share of the limit; for a greatest value the other way round. The condition with the least is the one that binds. The assured swing stands beside the swing asked for, though no brief makes it a condition but the ranking by cost.",
      source: "Definition.",
    },
    {
      id: "sensitivity",
      title: "For one per cent more",
      formulas: ["Δ S = S(1.005 p) − S(0.995 p)"],
      words:
        "What one per cent more of a component `p` does to the symmetric swing and to the centring error: the stage is solved with half a per cent more and with half a per cent less, all else the same, at the sheet's temperature. The second order of the change falls out of the difference.",
      source: "Central difference; any textbook of numerical analysis.",
      limits:
        "Where neither side is clearly the smaller, the swing bends there and one figure can't say both ways.",
    },
    {
      id: "better-value",
      title: "Closer to centre with one value changed",
      formulas: ["c(R') < c(R)"],
      words:
        "Each resistor in turn takes its neighbours in its own series, and where neither does better the nearest E192 value between them. What brings the centring error down, or else the assured swing up, and misses nothing that was met before is offered, the best first.",
      source: "The values of IEC 60063 are tried one by one.",
    },
  ],
};
