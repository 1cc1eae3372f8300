import { type KeyboardEvent, type PointerEvent, useState } from "react";
import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import { formatQuantity } from "#shared/values/engineering";
import type { LoadLineLayout } from "./load-line-layout";
import { outputAt, signedVolts } from "./load-line-words";

/** A point whose values are being read, with its name where it has one. */
export type Probe = FigurePoint & { name: string | null; onLine: boolean };

const STEPS = 60;
const REACH_PX = 11;

/**
 * Reads values off the figure: a pointer takes the named point within reach, or else the a.c. line under it; the
 * keyboard walks the a.c. line as a slider does, Page Up and Page Down from one named point to the next.
 */
export function useLineProbe(data: LoadLineData, layout: LoadLineLayout) {
  const [probe, setProbe] = useState<Probe | null>(null);
  const [focused, setFocused] = useState(false);
  const { transition, cutoff, q } = data;
  const stops = namedPoints(data);
  const start: Probe = { ...q, name: "Q-point", onLine: true };
  const shown = probe ?? (focused ? start : null);

  const at = (vds: number): Probe => {
    const stop = stops.find((candidate) => candidate.onLine && Math.abs(candidate.vds - vds) < 1e-9);
    return stop ?? { ...pointOnLine(data, vds), name: null, onLine: true };
  };

  const onPointer = (event: PointerEvent<HTMLElement>) => {
    const bounds = event.currentTarget.getBoundingClientRect();
    // The drawing may be shown scaled, as on paper.
    const scale = bounds.width > 0 ? (layout.plot.right - layout.plot.left) / bounds.width : 1;
    const pointer = {
      x: layout.plot.left + (event.clientX - bounds.left) * scale,
      y: layout.plot.top + (event.clientY - bounds.top) * scale,
    };
    const within = stops.filter((stop) => {
      const { x, y } = layout.toPx(stop);
      return Math.hypot(x - pointer.x, y - pointer.y) <= REACH_PX;
    });
    if (within.length > 0) setProbe(within[0]);
    else if (transition && cutoff) {
      setProbe(at(Math.min(cutoff.vds, Math.max(transition.vds, layout.x.invert(pointer.x)))));
    }
  };

  const onKeyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (!transition || !cutoff) return;
    const from = shown?.onLine ? shown.vds : q.vds;
    const next = nextVds(
      event.key,
      from,
      stops.filter((stop) => stop.onLine).map((stop) => stop.vds),
    );
    if (next === null) return;
    event.preventDefault();
    setProbe(at(next));
  };

  const sliderProps = {
    "aria-valuemin": transition?.vds ?? 0,
    "aria-valuemax": cutoff?.vds ?? data.vdd,
    "aria-valuetext": wordsOf(shown ?? start, data),
    onPointerMove: onPointer,
    onPointerDown: onPointer,
    onPointerLeave: () => setProbe(null),
    onFocus: () => setFocused(true),
    onBlur: () => {
      setFocused(false);
      setProbe(null);
    },
    onKeyDown,
  };
  return { probe: shown, sliderProps };
}

/** The points with a name, those on the a.c. line first and in order of rising VDS. */
function namedPoints({ q, transition, cutoff, corners }: LoadLineData): Probe[] {
  const named: Probe[] = [];
  if (transition) named.push({ ...transition, name: "transition point", onLine: true });
  named.push({ vds: q.vds, id: q.id, name: "Q-point", onLine: true });
  if (cutoff) named.push({ ...cutoff, name: "cutoff", onLine: true });
  for (const corner of corners) named.push({ ...corner, name: "corner of the spread", onLine: false });
  return named;
}

function pointOnLine({ q, cutoff }: LoadLineData, vds: number): FigurePoint {
  if (!cutoff || cutoff.vds === q.vds) return { vds: q.vds, id: q.id };
  return { vds, id: q.id * (1 - (vds - q.vds) / (cutoff.vds - q.vds)) };
}

function nextVds(key: string, from: number, stops: number[]): number | null {
  const first = stops[0];
  const last = stops[stops.length - 1];
  const step = (last - first) / STEPS;
  const clamp = (value: number) => Math.min(last, Math.max(first, value));
  const beyond = step / 100;
  switch (key) {
    case "ArrowRight":
    case "ArrowUp":
      return clamp(from + step);
    case "ArrowLeft":
    case "ArrowDown":
      return clamp(from - step);
    case "PageUp":
      return stops.find((stop) => stop > from + beyond) ?? last;
    case "PageDown":
      return stops.findLast((stop) => stop < from - beyond) ?? first;
    case "Home":
      return first;
    case "End":
      return last;
    default:
      return null;
  }
}

function wordsOf(probe: Probe, data: LoadLineData): string {
  const values = [
    probe.name,
    `VDS ${formatQuantity(probe.vds, "V")}`,
    `ID ${formatQuantity(probe.id, "A")}`,
    probe.onLine && data.room ? `output ${signedVolts(outputAt(data, probe.vds))} from rest` : null,
  ];
  return values.filter(Boolean).join(", ");
}
