import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";

/** Where 4 v² + 2 v - 18 = 0, volts: see below. */
const TRANSITION_VOLTS = (-2 + Math.sqrt(4 + 4 * 4 * 18)) / 8;

export const transition: FigurePoint = {
  vds: TRANSITION_VOLTS,
  id: 4e-3 * TRANSITION_VOLTS ** 2,
};

/**
 * A figure that can be checked by hand: 12 V rail, 1 kΩ in the drain, none in the source, a load of 1 kΩ. The d.c. line
 * falls by 1 mA/V, the a.c. line by 2 mA/V. With VT = 1 V, K = 4 mA/V² and λ = 0 the Q-point at 6 mA needs an
 * overdrive of √1.5 V; the a.c. line i = 18 mA - 2 mA/V · v meets the edge of saturation i = 4 mA/V² · v².
 */
export function buildLoadLineData(changes: Partial<LoadLineData> = {}): LoadLineData {
  return {
    polarity: "n",
    vdd: 12,
    dcLine: [
      { vds: 0, id: 12e-3 },
      { vds: 12, id: 0 },
    ],
    acLine: [
      { vds: 0, id: 18e-3 },
      { vds: 9, id: 0 },
    ],
    characteristics: [
      {
        vgs: 2,
        points: [
          { vds: 0, id: 0 },
          { vds: 1, id: 4e-3 },
          { vds: 12, id: 4e-3 },
        ],
      },
      {
        vgs: 2.2247,
        points: [
          { vds: 0, id: 0 },
          { vds: 1.2247, id: 6e-3 },
          { vds: 12, id: 6e-3 },
        ],
      },
      {
        vgs: 2.5,
        points: [
          { vds: 0, id: 0 },
          { vds: 1.5, id: 9e-3 },
          { vds: 12, id: 9e-3 },
        ],
      },
    ],
    edge: Array.from({ length: 21 }, (_, index) => ({ vds: index / 10, id: 4e-3 * (index / 10) ** 2 })),
    q: { vds: 6, id: 6e-3, vgs: 2.2247 },
    transition,
    cutoff: { vds: 9, id: 0 },
    room: { towardOhmic: 6 - TRANSITION_VOLTS, towardCutoff: 3 },
    spread: [
      { vds: 5, id: 7e-3 },
      { vds: 7.5, id: 6e-3 },
      { vds: 7, id: 5e-3 },
      { vds: 4.5, id: 6.5e-3 },
    ],
    corners: [
      { vds: 5, id: 7e-3 },
      { vds: 7, id: 5e-3 },
    ],
    wave: Array.from({ length: 61 }, (_, index) => {
      const t = (1.5 * index) / 60;
      return { t, vds: 6 - 2 * Math.sin(2 * Math.PI * t) };
    }),
    clipped: { towardOhmic: false, towardCutoff: false },
    ...changes,
  };
}
