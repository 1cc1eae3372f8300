import { type KeyboardEvent, useState } from "react";
import { formatQuantity } from "#shared/values/engineering";
import { parseQuantity } from "#shared/values/parse-quantity";

export type QuantityTextOptions = {
  /** SI; with the unit "%" a fraction: 0.05 reads as 5 %. */
  value: number | null;
  onChange: (value: number | null) => void;
  unit: string;
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
    if (draft.trim() === "") {
      if (!optional) return report("Fill this in");
      setDraft(null);
      report(null);
      onChange(null);
      return;
    }
    const read = parseQuantity(draft, unit);
    if (read === null) return report(unreadable(draft, unit));
    setDraft(null);
    report(null);
    if (read !== value) onChange(read);
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
function formatForEditing(value: number | null, unit: string, unitHidden: boolean): string {
  if (value === null) return "";
  if (unit === "%") return `${plain(value * 100)} %`;
  return unitHidden ? plain(value) : formatQuantity(value, unit, { exact: true });
}

/** Ten digits hide the rounding of a fraction times a hundred; the minus is a real one. */
function plain(value: number): string {
  return String(Number(value.toPrecision(10))).replace("-", "\u2212");
}

const EXAMPLES: Record<string, string> = {
  V: "12 V or 800 mV",
  A: "2 mA or 500 uA",
  "\u03a9": "4.7 k or 4k7",
  F: "100 n or 1 u",
  Hz: "20 or 20 kHz",
  W: "250 mW",
  "%": "5 %",
  "\u00b0C": "\u221210 or 50",
};

function unreadable(text: string, unit: string): string {
  const example = EXAMPLES[unit];
  return `“${text.trim()}” can't be read${example ? `; write it like ${example}` : " as a number"}`;
}
