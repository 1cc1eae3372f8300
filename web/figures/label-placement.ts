/** A point or a size in pixels of the drawing. */
export type Px = { x: number; y: number };
export type Box = { left: number; top: number; right: number; bottom: number };
export type Anchor = "start" | "middle" | "end";

/** Something a label should not lie on: the greater the weight, the more it is avoided. */
export type Obstacle = { path: Px[]; weight: number };

export type LabelCandidate = { at: Px; anchor: Anchor };
export type Label = { id: string; text: string; candidates: LabelCandidate[] };
export type PlacedLabel = { id: string; text: string; at: Px; anchor: Anchor; box: Box };

/** A label on another label, or outside the drawing, is unreadable: dearer than any line crossed. */
const UNREADABLE = 1000;
const CLEARANCE = 2;

/**
 * Gives each label the candidate place that covers least, in the order given, so that earlier labels have the first
 * choice. Among equal places the earlier candidate wins.
 *
 * @param bounds what no label may leave
 * @param fontSize pixels, for the estimated widths
 * @param taken boxes that are occupied already
 */
export function placeLabels(
  labels: readonly Label[],
  obstacles: readonly Obstacle[],
  bounds: Box,
  fontSize: number,
  taken: readonly Box[] = [],
): PlacedLabel[] {
  const placed: PlacedLabel[] = [];
  for (const { id, text, candidates } of labels) {
    let best: PlacedLabel | null = null;
    let bestCost = Number.POSITIVE_INFINITY;
    for (const candidate of candidates) {
      const box = boxOf(text, candidate, fontSize);
      const others = [...taken, ...placed.map((label) => label.box)];
      const cost = costOf(box, obstacles, others, bounds);
      if (cost < bestCost) {
        best = { id, text, ...candidate, box };
        bestCost = cost;
      }
    }
    if (best) placed.push(best);
  }
  return placed;
}

/** Widths in ems by kind of character, measured on Instrument Sans at 400 and 600 and rounded up. */
function characterEms(character: string): number {
  if (" .,1ijl".includes(character)) return 0.28;
  if ("mMW".includes(character)) return 0.94;
  return /[A-ZΩµ]/.test(character) ? 0.77 : 0.6;
}

/** The width a text will take, estimated, since a drawing is laid out before it can be measured. */
export function textWidth(text: string, fontSize: number): number {
  return fontSize * [...text].reduce((ems, character) => ems + characterEms(character), 0);
}

function boxOf(text: string, { at, anchor }: LabelCandidate, fontSize: number): Box {
  const width = textWidth(text, fontSize);
  const left = anchor === "start" ? at.x : anchor === "end" ? at.x - width : at.x - width / 2;
  return { left, right: left + width, top: at.y - fontSize * 0.8, bottom: at.y + fontSize * 0.25 };
}

function costOf(box: Box, obstacles: readonly Obstacle[], others: readonly Box[], bounds: Box): number {
  const roomy = grow(box, CLEARANCE);
  let cost = 0;
  for (const other of others) if (overlaps(roomy, other)) cost += UNREADABLE;
  const outside =
    Math.max(0, bounds.left - box.left) +
    Math.max(0, box.right - bounds.right) +
    Math.max(0, bounds.top - box.top) +
    Math.max(0, box.bottom - bounds.bottom);
  if (outside > 0) cost += UNREADABLE + outside;
  for (const { path, weight } of obstacles) {
    for (let index = 1; index < path.length; index++) {
      cost += weight * lengthInside(path[index - 1], path[index], roomy);
    }
  }
  return cost;
}

function grow(box: Box, by: number): Box {
  return { left: box.left - by, right: box.right + by, top: box.top - by, bottom: box.bottom + by };
}

export function overlaps(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/** How much of a segment lies inside a box, pixels (Liang and Barsky 1984). */
export function lengthInside(from: Px, to: Px, box: Box): number {
  const dx = to.x - from.x;
  const dy = to.y - from.y;
  let enter = 0;
  let leave = 1;
  const edges = [
    [-dx, from.x - box.left],
    [dx, box.right - from.x],
    [-dy, from.y - box.top],
    [dy, box.bottom - from.y],
  ];
  for (const [direction, distance] of edges) {
    if (direction === 0) {
      if (distance < 0) return 0;
      continue;
    }
    const crossing = distance / direction;
    if (direction < 0) enter = Math.max(enter, crossing);
    else leave = Math.min(leave, crossing);
  }
  return enter < leave ? (leave - enter) * Math.hypot(dx, dy) : 0;
}
