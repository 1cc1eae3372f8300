import type { ReactNode } from "react";
import type { DrawnStage } from "./drawn-stage";

/** The look of every line of a schematic. */
const LINE = "fill-none stroke-ink";

type WireProps = { d: string; dashed?: boolean };

/** A wire along an SVG path. */
export function Wire({ d, dashed = false }: WireProps) {
  return (
    <path
      d={d}
      strokeWidth="1.4"
      strokeLinejoin="round"
      strokeLinecap="round"
      strokeDasharray={dashed ? "2 3.5" : undefined}
      className={LINE}
    />
  );
}

/** Where wires meet. */
export function Junction({ x, y }: { x: number; y: number }) {
  return <circle cx={x} cy={y} r="2.2" className="fill-ink" />;
}

type WordsProps = { x: number; y: number; anchor?: "start" | "middle" | "end"; children: ReactNode };

function Words({ x, y, anchor = "start", children }: WordsProps) {
  return (
    <text x={x} y={y} textAnchor={anchor} className="fill-ink font-sans text-[12px]">
      {children}
    </text>
  );
}

const BODY = 24;
const WIDTH = 9;

type ResistorProps = {
  label: string;
  x: number;
  /** Upper and lower end of its leads. */
  from: number;
  to: number;
  /** May be left out of the circuit. */
  optional?: boolean;
};

/** An upright resistor with its leads, its name at the left. */
export function Resistor({ label, x, from, to, optional = false }: ResistorProps) {
  const middle = (from + to) / 2;
  const top = middle - BODY / 2;
  return (
    <>
      <Wire d={`M${x} ${from}V${top}M${x} ${top + BODY}V${to}`} dashed={optional} />
      <Wire d={box(x - WIDTH / 2, top, WIDTH, BODY)} dashed={optional} />
      <Words x={x - WIDTH} y={middle + 4} anchor="end">
        {label}
      </Words>
    </>
  );
}

/** A lying resistor with its leads, its name below. */
export function LyingResistor({
  label,
  y,
  from,
  to,
}: {
  label: string;
  y: number;
  from: number;
  to: number;
}) {
  const middle = (from + to) / 2;
  const left = middle - BODY / 2;
  return (
    <>
      <Wire d={`M${from} ${y}H${left}M${left + BODY} ${y}H${to}`} />
      <Wire d={box(left, y - WIDTH / 2, BODY, WIDTH)} />
      <Words x={middle} y={y + WIDTH + 8} anchor="middle">
        {label}
      </Words>
    </>
  );
}

function box(x: number, y: number, width: number, height: number): string {
  return `M${x} ${y}h${width}v${height}h${-width}z`;
}

const PLATE = 8;
const GAP = 2.5;

/** A terminal and its coupling capacitor, up to the node that it joins. */
export function Coupled({ label, node, y, end }: { label: string; node: number; y: number; end: number }) {
  const way = Math.sign(node - end);
  const middle = (node + end) / 2;
  return (
    <>
      <circle cx={end} cy={y} r="3" strokeWidth="1.4" className={LINE} />
      <Wire d={`M${end + 3 * way} ${y}H${middle - GAP * way}M${middle + GAP * way} ${y}H${node}`} />
      <Wire d={`M${middle - GAP} ${y - PLATE}v${2 * PLATE}M${middle + GAP} ${y - PLATE}v${2 * PLATE}`} />
      <Words x={end} y={y - 9} anchor="middle">
        {label}
      </Words>
    </>
  );
}

/** A bypass capacitor from a node down to ground, beside the resistor that it bypasses. */
export function Bypass({ node, x, from, to }: { node: number; x: number; from: number; to: number }) {
  const middle = (from + to) / 2;
  return (
    <>
      <Junction x={node} y={from} />
      <Wire d={`M${node} ${from}H${x}V${middle - GAP}M${x} ${middle + GAP}V${to}`} />
      <Wire d={`M${x - PLATE} ${middle - GAP}h${2 * PLATE}M${x - PLATE} ${middle + GAP}h${2 * PLATE}`} />
      <Ground x={x} y={to} />
    </>
  );
}

/** Ground, under a lead that ends at `y`. */
export function Ground({ x, y }: { x: number; y: number }) {
  return <Wire d={`M${x - 8} ${y}h16M${x - 5} ${y + 3.5}h10M${x - 2} ${y + 7}h4`} />;
}

type RailProps = { label: string; from: number; to: number; y: number; below?: boolean };

/** A supply rail with its name. */
export function Rail({ label, from, to, y, below = false }: RailProps) {
  return (
    <>
      <Wire d={`M${from} ${y}H${to}`} />
      <Words x={to} y={below ? y + 13 : y - 6} anchor="end">
        {label}
      </Words>
    </>
  );
}

/** How far drain and source lead reach above and below the gate's line. */
export const LEAD = 16;
/** How far the gate's lead reaches to the left of drain and source. */
export const GATE_LEAD = 28;

/** An enhancement MOSFET, its body tied to its source, with the Q-point beside it. */
export function Mosfet({ x, y, channel }: { x: number; y: number; channel: DrawnStage["channel"] }) {
  const plate = x - 18;
  const line = x - 13;
  const [tip, back] = channel === "n" ? [line, line + 6] : [line + 8, line + 2];
  return (
    <>
      <Wire d={`M${x - GATE_LEAD} ${y}H${plate}M${plate} ${y - 10}v20`} />
      <Wire d={`M${line} ${y - 12.5}v6M${line} ${y - 3}v6M${line} ${y + 6.5}v6`} />
      <Wire
        d={`M${line} ${y - 9.5}H${x}V${y - LEAD}M${line} ${y}H${x}M${line} ${y + 9.5}H${x}M${x} ${y}V${y + LEAD}`}
      />
      <path d={`M${tip} ${y}L${back} ${y - 3}V${y + 3}z`} className="fill-ink" />
      <circle cx={x + 11} cy={y} r="4" className="fill-ember" data-part="q-point" />
    </>
  );
}
