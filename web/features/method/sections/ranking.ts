/** How the fits are chosen, paragraph by paragraph. Formulas between backquotes. */
export const RANKING: readonly string[] = [
  "A fit is one MOSFET with the resistors of the brief's circuit, solved for the typical device at 25 °C. Every condition of the brief is a hard limit; the dissipation is held at the brief's highest temperature.",
  "Three orders are on offer. Best centred: the least centring error comes first, counted in whole per cent, rounded down, because less is noise; within one per cent the greater assured swing. Most assured swing: the greatest swing that every build inside the spread still has. Least cost: the cheapest transistor and resistors for the whole build, among the fits whose assured swing reaches the brief's swing.",
  "Ties, so that the list never depends on luck: the smaller supply current, then part number, `R_1`, `R_2`, `R_G`, `R_D`, `R_S`, `R_{S2}`. The list shows the best set of each part; a row opens to the part's other sets.",
  "The result is exact: the same list that testing every combination would give. No sampling, no guess. Combinations are left untested only where a bound proves that they can't be in the list. A search that its time limit ends says so.",
  "A part that has no fit is counted once, by the filter or rating that bars it, or by the furthest condition that any of its combinations reached. Where nothing fits, the product names the one condition that, dropped alone, lets the most parts in, and how near the nearest miss came.",
];

export const VALUES: readonly string[] = [
  "Resistors are taken from the preferred values of IEC 60063, E3 to E192. E24 and below are a list of their own; from E48 up the values are `100 · 10^{k/n}` rounded, but for 920 of E192.",
  "Values may be shown as marked on the part by IEC 60062: the letter stands where the point would, 4k7 for 4.7 kΩ, 4R7 for 4.7 Ω, 2M2 for 2.2 MΩ. The menu under your name switches to 4.7 kΩ.",
  "Computed figures carry three significant digits unless more are asked for; a stated value keeps every digit it has.",
];

export const ASSUMPTIONS: readonly string[] = [
  "The device is the square law above, its body tied to its source, typical values unless a figure says otherwise.",
  "At mid-band the capacitors are shorts to a signal; for direct current they are open.",
  "The rail is stiff: its own impedance, hum and noise are not in any figure.",
  "Distortion is static and is that of the device law alone.",
  "Noise, leakage, slow drift and thermal feedback are not worked out.",
  "P-channel stages are shown in magnitudes, from the common rail.",
];
