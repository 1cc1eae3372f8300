const DAY = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric" });

/** A day in this browser's time zone: 2 Nov 2026. */
export function formatDay(iso: string): string {
  return DAY.format(new Date(iso));
}
