import { type KeyboardEvent, useState } from "react";
import { formatQuantity } from "#shared/values/engineering";
import { parseQuantity } from "#shared/values/parse-quantity";
import type { Unit } from "#shared/values/units";

export type QuantityTextOptions = {
  /** SI; with the unit "%" a fraction: 0.05 reads as 5 %. */
  value: number | null;
  onChange: (value: number | null) => void;
  unit: Unit;
  /** An empty box is an answer (null) rather than an error. */
  optional?: boolean;
  /** Shows the bare number where the words around it give the unit. */
  unitHidden?: boolean;
  /** Arrow up and down: asks for a neighbouring value. */
  onStep?: (direction: "lower" | "higher") => void;
  /** Told when the text can't be read, and null once it can. */
  onUnreadable?: (message: string | null) => void;
};

/**
 * A quantity edited as text: reads what an engineer types ("4k7", "4.7 kΩ", "4700") when the box is left or on Enter,
 * puts it back in engineering notation, and keeps what can't be read in sight with the reason.
 */
export function useQuantityText(options: QuantityTextOptions) {
  const { value, onChange, unit, optional = false, unitHidden = false, onStep, onUnreadable } = options;
  const shown = formatForEditing(value, unit, unitHidden);
  const [draft, setDraft] = useState<string | null>(null);
  const [error, setError] = useState<string | null>(null);

  const report = (message: string | null) => {
    setError(message);
    onUnreadable?.(message);
  };

  const commit = () => {
    if (draft === null || draft.trim() === shown) {
      setDraft(null);
      report(null);
      return;
    }
    const empty = draft.trim() === "";
    const read = empty && optional ? { ok: true as const, value: null } : parseQuantity(draft, unit);
    report(read.ok ? null : read.message);
    if (!read.ok) return;
    setDraft(null);
    if (read.value !== value) onChange(read.value);
  };

  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === "Enter") commit();
    if (event.key === "Escape" && draft !== null) {
      event.stopPropagation();
      setDraft(null);
      report(null);
    }
    if (onStep && draft === null && (event.key === "ArrowUp" || event.key === "ArrowDown")) {
      event.preventDefault();
      onStep(event.key === "ArrowUp" ? "higher" : "lower");
    }
  };

  return {
    text: draft ?? shown,
    error,
    inputProps: {
      value: draft ?? shown,
      onChange: (event: { target: { value: string } }) => setDraft(event.target.value),
      onBlur: commit,
      onKeyDown,
    },
  };
}

/** A value as it stands in the box: every digit it has, so that leaving the box changes nothing. */
function formatForEditing(value: number | null, unit: Unit, unitHidden: boolean): string {
  if (value === null) return "";
  const text = formatQuantity(value, unit, { exact: true });
  return unitHidden && text.endsWith(` ${unit}`) ? text.slice(0, -unit.length - 1) : text;
}
