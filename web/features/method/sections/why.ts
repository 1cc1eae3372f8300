import type { MethodSection } from "../section";

export const WHY: MethodSection = {
  id: "why",
  title: "Why a stage is as it is",
  opening:
    "A stage's sheet says which limit binds, what each component does, and which value would do better. All of it is worked out for the typical device at 25 °C, as the ranking judges a fit.",
  entries: [
    {
      id: "margin",
      title: "Margin to a limit",
      formulas: ["m = {x − x_{least}}/{x_{least}},  m = {x_{most} − x}/{x_{most}}"],
      words:
        "What is left between a figure and its limit, as a share of the limit; below zero, the limit is missed. The least margin among the limits that must be met is the one that binds. The assured swing is set against the swing asked for as well, though only the ranking by cost requires that of it. The dissipation is held to what the derated rating allows at the highest ambient temperature.",
      source: "Definition.",
      limits: "What the resistors dissipate is judged in the ranking, which knows the sizes on offer.",
    },
    {
      id: "sensitivity",
      title: "What +1 % of a component does",
      formulas: [
        "Δ U = 0.01 {U((1 + h) p) − U((1 − h) p)}/{2h},  h = 10^{−5}",
        "Δ c = ± 2 {D Δ U − U Δ D}/{(U + D)^2}",
      ],
      words:
        "The slopes of both rooms against a component `p`, taken by central differences on the solved stage, and from them those of the symmetric swing, which follows the lesser room, and of the centring error, plus where `U > D`. The error of the difference falls with `h^2` and that of rounding grows with `1/h`; at this `h` both are near `10^{−10}`.",
      source: "Central difference; derivative of the definitions of `S` and `c`.",
      limits:
        "A slope holds near the present values. At dead centre the lesser room changes sides and the slopes of `S` and `c` turn, so a well-centred stage can't be bettered by the whole change that is shown.",
    },
    {
      id: "better-value",
      title: "Better with one value changed",
      formulas: [],
      words:
        "Each resistor in turn, all else kept. First the step of its own series that lowers the centring error most; where neither step does, the nearest value of E192 between them that lowers it; where that has none either, the step that raises the assured swing most. What would leave the brief's range of values or miss a condition that is met now is not offered.",
      source: "The values of IEC 60063, tried one by one.",
      limits:
        "A gain of less than 0.1 percentage points, or of less than 1 % of assured swing, is not offered. Stock is not looked at.",
    },
  ],
};
