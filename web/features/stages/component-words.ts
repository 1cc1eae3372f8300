import type { Component } from "#shared/bias/why/sensitivities";
import { formatQuantity, formatResistance, type ResistanceStyle } from "#shared/values/engineering";

const NAMES: Partial<Record<Component, string>> = {
  rail: "rail",
  negativeRail: "negative rail",
  rl: "load",
  vt: "threshold",
  k: "conduction parameter",
};

/** What a component is called: R1, the rail, the threshold. */
export function nameOfComponent(component: Component): string {
  return NAMES[component] ?? component.toUpperCase();
}

/** A component's value with its unit, three digits of what was worked out. */
export function componentValue(component: Component, value: number, resistances: ResistanceStyle): string {
  switch (component) {
    case "vt":
    case "rail":
    case "negativeRail":
      return formatQuantity(value, "V");
    case "k":
      return formatQuantity(value, "A/V²");
    default:
      return formatResistance(value, resistances, 3);
  }
}
