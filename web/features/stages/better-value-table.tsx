import { useRef } from "react";
import type { BetterValue } from "#shared/bias/why/better-values";
import type { Resistors } from "#shared/schemas/circuit";
import { formatPercent, formatQuantity, formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { CompactTable } from "./compact-table";

type BetterValueTableProps = {
  better: readonly BetterValue[];
  resistors: Resistors;
  onChange: (resistors: Resistors) => void;
};

/** Values that would better the stage, each to be tried by a click, like a step. */
export function BetterValueTable({ better, resistors, onChange }: BetterValueTableProps) {
  const { resistances } = usePreferences();
  const place = useRef<HTMLDivElement>(null);
  const tryOut = ({ resistor, value }: BetterValue) => {
    // The button goes with what it offered; the keyboard stays where the next offers come.
    place.current?.focus();
    onChange({ ...resistors, [resistor]: value });
  };
  return (
    <div ref={place} tabIndex={-1} data-no-print="" className="outline-none">
      <CompactTable
        title="One value changed"
        anchor="better-value"
        columns={{ name: "try", series: "of", centring: "off centre", assured: "every board" }}
        rows={better.map((one) => ({
          id: one.resistor,
          cells: {
            name: (
              <button
                type="button"
                aria-label={`Try ${one.resistor.toUpperCase()} ${formatResistance(one.value, resistances)}`}
                onClick={() => tryOut(one)}
                className="py-0.5 underline decoration-edge underline-offset-3 hover:decoration-ink"
              >
                {one.resistor.toUpperCase()}{" "}
                <span className="value">{formatResistance(one.value, resistances)}</span>
              </button>
            ),
            series: one.series,
            centring: formatPercent(one.centringError),
            assured: formatQuantity(one.assured, "V"),
          },
        }))}
      />
      {better.length === 0 && (
        <p className="pt-1 text-quiet text-sm">
          No single resistor betters it: neither one step of its series nor a value of E192 on the way there.
        </p>
      )}
    </div>
  );
}
