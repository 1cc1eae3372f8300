import { formatQuantity } from "#shared/values/engineering";

/** Peak volts at the output, each way from the Q-point. */
export type Rooms = { towardOhmic: number; towardCutoff: number };

const volts = (value: number) => formatQuantity(value, "V");

/** The balance bar in words: both rooms, what limits, and what every build keeps. */
export function balanceSentence(room: Rooms, assured: Rooms | null): string {
  const { towardOhmic, towardCutoff } = room;
  const ohmic = `${volts(towardOhmic)} of room toward the ohmic region`;
  const cutoff = `${volts(towardCutoff)} toward cutoff`;
  return `${ohmic}, ${cutoff}; ${limitOf(room)}.${assured ? ` ${assuredWords(assured)}` : ""}`;
}

function limitOf({ towardOhmic, towardCutoff }: Rooms): string {
  if (volts(towardOhmic) === volts(towardCutoff)) return "the Q-point is centred";
  return towardOhmic < towardCutoff ? "the ohmic region limits" : "cutoff limits";
}

function assuredWords(assured: Rooms): string {
  if (Math.min(assured.towardOhmic, assured.towardCutoff) <= 0) return "No swing is assured for every build.";
  return `Every build has ${volts(assured.towardOhmic)} and ${volts(assured.towardCutoff)}.`;
}
