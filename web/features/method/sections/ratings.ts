import type { MethodSection } from "../section";

export const FREQUENCY: MethodSection = {
  id: "frequency",
  title: "Corners",
  opening:
    "The stage passes what lies between its low corner, which the capacitors set, and its high corner, which the device's own capacitances set. A corner is where the gain has fallen by 3 dB from mid-band.",
  entries: [
    {
      id: "low-corner",
      title: "Smallest capacitors for the low corner",
      formulas: [
        "|H|^2 = {(ω R_i C_i)^2}/{1 + (ω R_i C_i)^2} · {(ω R_o C_o)^2}/{1 + (ω R_o C_o)^2} · {R_x^2}/{R_S^2} · {1 + (ω R_S C_S)^2}/{1 + (ω R_x C_S)^2} = {1}/{2}",
        "R_i = R_{sig} + R_{in},  R_o = R_{out} + R_L,  R_x = R_S || {r_o + r_L}/{1 + g_m r_o}",
      ],
      words:
        "The bypass capacitor works against the least resistance, so it is the largest: it sets the corner, and the coupling capacitors stay a decade below. Without a bypass capacitor, two coupling capacitors share the corner: each is set to `f (√{2} − 1)^{1/2}`, or 0.64 `f`. The product of the three responses gives these proportions; the nodes of the whole circuit, source impedance and feedback included, are then solved with all capacitors in place, and all are scaled by one factor until the corner is met. Round up to a preferred value.",
      source: "Nodal analysis of the small-signal circuit; the shares are common practice.",
      limits:
        "Exact values without tolerance. Ceramic capacitors lose capacitance with voltage, electrolytics have −20 %.",
    },
    {
      id: "high-corner",
      title: "High corner",
      formulas: [
        "|A(f)|^2 = {1}/{2} |A(0)|^2",
        "C_{gs} = C_{iss} − C_{rss},  C_{gd} = C_{rss},  C_{ds} = C_{oss} − C_{rss}",
      ],
      words:
        "The lowest frequency at which that holds, from the nodes of gate, drain and source with the source impedance in front. By hand the two poles are near `1/(2π (R_{sig} || R_{in}) (C_{gs} + C_{gd} (1 + |A_v|)))` and `1/(2π (r_L || r_o) (C_{ds} + C_{gd}))`: the first is where Miller's effect bites.",
      source:
        "Nodal analysis. J. M. Miller, “Dependence of the input impedance of a three-electrode vacuum tube upon the load in the plate circuit”, Scientific Papers of the Bureau of Standards 15, 1920.",
      limits:
        "Datasheet capacitances are taken as constants; real ones change with the drain voltage. Wiring and the load's own capacitance are not in it.",
    },
  ],
};

export const RATINGS: MethodSection = {
  id: "ratings",
  title: "Heat and ratings",
  opening: "A stage is held to the part's ratings, derated by the brief, at the highest ambient temperature.",
  entries: [
    {
      id: "dissipation",
      title: "Dissipation",
      formulas: [
        "P = V_{DSQ} I_{DQ}",
        "P_{max}(T) = P_{25} {T_{j,max} − T}/{T_{j,max} − 25 °C}  above 25 °C",
      ],
      words: "What the device turns into heat at rest, and what its rating allows at an ambient temperature.",
      source: "The derating line of every datasheet.",
      limits: "At rest: a signal adds a little or takes a little away.",
    },
    {
      id: "junction-temperature",
      title: "Junction temperature",
      formulas: ["T_j = T + R_{θJA} P"],
      words:
        "Ambient temperature plus the thermal resistance from junction to ambient times the dissipation.",
      source: "Definition of the thermal resistance.",
      limits: "Still air and the datasheet's board: another board may be twice as hot.",
    },
    {
      id: "derating",
      title: "Derating",
      formulas: ["V_{DD} ≤ d_{DS} V_{DSS}", "P ≤ d_P P_{max}(T)", "P_R ≤ d_R P_{R,rated}"],
      words:
        "`d_{DS}`, `d_P` and `d_R` are the brief's deratings of the drain-source rating, the dissipation and the resistors. For the resistors the rating is that of the largest size on offer at the brief's tolerance.",
      source: "Common practice in design rules.",
    },
  ],
};
