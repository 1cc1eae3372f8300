import type { FieldError } from "#shared/schemas/problem";

/**
 * Names the fields in which two records differ, by dotted path, for whoever edited a version that is no longer the
 * latest.
 */
export function changedFields(before: unknown, now: unknown, path: string[] = []): FieldError[] {
  if (isRecord(before) && isRecord(now)) {
    const keys = new Set([...Object.keys(before), ...Object.keys(now)]);
    return [...keys].flatMap((key) => changedFields(before[key], now[key], [...path, key]));
  }
  if (JSON.stringify(before) === JSON.stringify(now)) return [];
  return [{ path: path.join("."), message: `Is now ${words(now)}` }];
}

function words(value: unknown): string {
  return value === undefined || value === null ? "empty" : JSON.stringify(value);
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}
