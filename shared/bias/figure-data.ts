/**
 * What the load-line figure draws, as plain data in SI units. Voltages and currents are magnitudes for both
 * polarities.
 */

/** A point of the output plane: volts from drain to source, amperes into the drain. */
export type FigurePoint = { vds: number; id: number };

/** One output characteristic, its points in order of rising VDS. */
export type Characteristic = { vgs: number; points: FigurePoint[] };

/** The output wave at one instant: `t` in periods from the start of the drawing, `vds` with clipping as it would be. */
export type WavePoint = { t: number; vds: number };

/** Peak volts at the output, each way from rest. */
export type Room = { towardOhmic: number; towardCutoff: number };

export type LoadLineData = {
  polarity: "n" | "p";
  /** The rail, volts. */
  vdd: number;
  /** From VDS = 0 down to ID = 0. */
  dcLine: [FigurePoint, FigurePoint];
  /** From VDS = 0 down to ID = 0, through the Q-point; null where the Q-point carries no signal (off, or ohmic). */
  acLine: [FigurePoint, FigurePoint] | null;
  /** In order of rising VGS; the one through the Q-point has `vgs` equal to `q.vgs`. */
  characteristics: Characteristic[];
  /** The edge of saturation from the origin upward. */
  edge: FigurePoint[];
  q: FigurePoint & { vgs: number };
  /** Where the a.c. line meets the edge of saturation; null with `acLine`. */
  transition: FigurePoint | null;
  /** Where the a.c. line meets ID = 0; null with `acLine`. */
  cutoff: FigurePoint | null;
  room: Room | null;
  /** The outline of where the Q-point of any build may land; null where the spread isn't known. */
  spread: FigurePoint[] | null;
  /** Q-points of the builds at the corners of the spread. */
  corners: FigurePoint[];
  /** Empty where there is no signal to draw. */
  wave: WavePoint[];
  clipped: { towardOhmic: boolean; towardCutoff: boolean };
};
