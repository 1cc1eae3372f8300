import { balanceSentence, type Rooms } from "./balance-sentence";

type BalanceBarProps = Rooms & {
  /** The room that every build inside the spread still has; null where it isn't known. */
  assured: Rooms | null;
  /** The volts that half the bar's width stands for: the largest one-sided room among the bars compared. */
  scale: number;
  size?: "row" | "sheet";
  /** Put before the sentence that stands in for the drawing, such as the part's number. */
  label?: string;
};

const SIZES = {
  row: { height: 26, bar: 6, mark: 16, dot: 4.5 },
  sheet: { height: 44, bar: 6, mark: 18, dot: 5 },
} as const;

/**
 * Room toward the ohmic region at the left, room toward cutoff at the right, the Q-point between them, the assured
 * part darker. Lengths are per cent of the width, so the same drawing fits a table row and a sheet.
 */
export function BalanceBar({
  towardOhmic,
  towardCutoff,
  assured,
  scale,
  size = "row",
  label,
}: BalanceBarProps) {
  const { height, bar, mark, dot } = SIZES[size];
  const middle = height / 2;
  const top = middle - bar / 2;
  const ohmic = halfPercent(towardOhmic, scale);
  const cutoff = halfPercent(towardCutoff, scale);
  const assuredOhmic = assured ? Math.min(ohmic, halfPercent(assured.towardOhmic, scale)) : 0;
  const assuredCutoff = assured ? Math.min(cutoff, halfPercent(assured.towardCutoff, scale)) : 0;
  const sentence = balanceSentence({ towardOhmic, towardCutoff }, assured);
  return (
    // The marks at the ends stand outside the lengths, so they get room of their own.
    <div className="px-1.5">
      <svg
        role="img"
        aria-label={label ? `${label}: ${sentence}` : sentence}
        width="100%"
        height={height}
        className="block overflow-visible [&_rect]:transition-[x,width] [&_rect]:duration-150"
      >
        <rect x="50%" width="1" y="0" height={height} transform="translate(-0.5 0)" className="fill-rule" />
        <Length
          start={50 - ohmic}
          percent={ohmic}
          y={top}
          height={bar}
          className="fill-ohmic/25"
          part="room"
        />
        <Length start={50} percent={cutoff} y={top} height={bar} className="fill-cutoff/30" part="room" />
        <Length
          start={50 - assuredOhmic}
          percent={assuredOhmic}
          y={top}
          height={bar}
          className="fill-ohmic/80"
          part="assured"
        />
        <Length
          start={50}
          percent={assuredCutoff}
          y={top}
          height={bar}
          className="fill-cutoff/90"
          part="assured"
        />
        <svg x={`${50 - ohmic}%`} y={middle} overflow="visible" aria-hidden="true">
          <path
            d={`M2 ${-mark / 2}Q-3.5 0 2 ${mark / 2}`}
            fill="none"
            strokeWidth="1.75"
            className="stroke-ohmic"
          />
        </svg>
        <svg x={`${50 + cutoff}%`} y={middle} overflow="visible" aria-hidden="true">
          <path d={`M0 ${-mark / 2}V${mark / 2}`} fill="none" strokeWidth="1.5" className="stroke-cutoff" />
        </svg>
        <circle cx="50%" cy={middle} r={dot} strokeWidth="1.5" className="fill-ember stroke-paper" />
      </svg>
    </div>
  );
}

/** A room as per cent of the bar's whole width; the half of the width is the scale. */
function halfPercent(room: number, scale: number): number {
  if (!(scale > 0)) return 0;
  return 50 * Math.min(1, Math.max(0, room / scale));
}

type LengthProps = {
  start: number;
  percent: number;
  y: number;
  height: number;
  className: string;
  part: "room" | "assured";
};

function Length({ start, percent, y, height, className, part }: LengthProps) {
  return (
    <rect
      x={`${start}%`}
      width={`${percent}%`}
      y={y}
      height={height}
      className={className}
      data-part={part}
    />
  );
}
