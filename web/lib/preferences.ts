import { useSyncExternalStore } from "react";
import type { ResistanceStyle } from "#shared/values/engineering";

export type Theme = "system" | "light" | "dark";

type Preferences = { theme: Theme; resistances: ResistanceStyle };

const KEY = "evenswing-preferences";
const DEFAULTS: Preferences = { theme: "system", resistances: "rkm" };
const listeners = new Set<() => void>();

function read(): Preferences {
  try {
    return { ...DEFAULTS, ...JSON.parse(localStorage.getItem(KEY) ?? "{}") };
  } catch {
    return DEFAULTS;
  }
}

let current = read();

/** Sets the page's colours; also called once at the start. */
export function applyTheme(): void {
  if (current.theme === "system") delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = current.theme;
}

export function setPreferences(change: Partial<Preferences>): void {
  current = { ...current, ...change };
  localStorage.setItem(KEY, JSON.stringify(current));
  applyTheme();
  for (const listener of listeners) listener();
}

/** What this browser's person prefers: colours, and how resistances are written. */
export function usePreferences(): Preferences {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => current,
  );
}
