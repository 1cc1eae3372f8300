import { type Brief, briefSchema } from "#shared/schemas/brief";

/** The brief that a new page starts from: the sentence, filled in with a common case. */
export const STARTING_BRIEF: Brief = briefSchema.parse({
  rail: { volts: 12, tolerance: 0.05 },
  load: { ohms: 10e3 },
  swing: { peak: 1 },
  ambient: { min: 0, max: 50 },
});

type Tree = { [key: string]: unknown };

function isTree(value: unknown): value is Tree {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

/** What of a tree differs from another. */
function difference(value: Tree, base: Tree): Tree {
  const result: Tree = {};
  for (const key of new Set([...Object.keys(value), ...Object.keys(base)])) {
    const own = value[key];
    const other = base[key];
    if (isTree(own) && isTree(other)) {
      const inner = difference(own, other);
      if (Object.keys(inner).length > 0) result[key] = inner;
    } else if (JSON.stringify(own) !== JSON.stringify(other)) {
      result[key] = own ?? null;
    }
  }
  return result;
}

/** Whether two briefs ask for the same, in whatever order their fields were filled in. */
export function isSameBrief(a: Brief, b: Brief): boolean {
  return Object.keys(difference(a as Tree, b as Tree)).length === 0;
}

function merge(base: Tree, change: Tree): Tree {
  const result: Tree = { ...base };
  for (const [key, value] of Object.entries(change)) {
    const other = result[key];
    result[key] = isTree(value) && isTree(other) ? merge(other, value) : value;
  }
  return result;
}

/** The fields that may be null; elsewhere null in an address means "left out". */
function withoutNulls(tree: Tree, path = ""): Tree {
  const kept = Object.entries(tree).filter(
    ([key, value]) => value !== null || `${path}${key}` === "load.ohms",
  );
  return Object.fromEntries(
    kept.map(([key, value]) => [key, isTree(value) ? withoutNulls(value, `${path}${key}.`) : value]),
  );
}

/** A whole brief in few characters, for an address: only what differs from the starting brief; "" for that one. */
export function writeBriefParameter(brief: Brief): string {
  const changed = difference(brief as Tree, STARTING_BRIEF as Tree);
  return Object.keys(changed).length === 0 ? "" : JSON.stringify(changed);
}

/** Reads a brief back from an address; null when it holds none that is valid. */
export function readBriefParameter(text: string | null): Brief | null {
  if (!text) return STARTING_BRIEF;
  try {
    const changed: unknown = JSON.parse(text);
    if (!isTree(changed)) return null;
    const parsed = briefSchema.safeParse(withoutNulls(merge(STARTING_BRIEF as Tree, changed)));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}
