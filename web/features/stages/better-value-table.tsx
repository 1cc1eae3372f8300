import { useRef } from "react";
import type { BetterValue } from "#shared/bias/why/better-values";
import type { Resistors } from "#shared/schemas/circuit";
import { formatPercent, formatQuantity, formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { CompactTable } from "./compact-table";

type BetterValueTableProps = {
  better: readonly BetterValue[];
  /** What the stage has as it is; the centring error is null where it isn't saturated. */
  present: { centringError: number | null; assured: number };
  resistors: Resistors;
  onChange: (resistors: Resistors) => void;
};

/** Values that would better the stage, each to be tried by a click, like a step. */
export function BetterValueTable({ better, present, resistors, onChange }: BetterValueTableProps) {
  const place = useRef<HTMLDivElement>(null);
  const tryOut = ({ resistor, value }: BetterValue) => {
    // The button goes with what it offered; the keyboard stays where the next offers come.
    place.current?.focus();
    onChange({ ...resistors, [resistor]: value });
  };
  return (
    <div ref={place} tabIndex={-1} data-no-print="" className="outline-none">
      <CompactTable
        title="Better with one value changed"
        anchor="better-value"
        columns={{ name: "try", series: "from", centring: "off centre", assured: "every board" }}
        rows={[
          { id: "present", cells: { name: "as it is", series: "", ...figuresOf(present) } },
          ...better.map((one) => ({
            id: one.resistor,
            cells: {
              name: <TryButton {...one} onTry={() => tryOut(one)} />,
              series: one.series,
              ...figuresOf(one),
            },
          })),
        ]}
      />
      {better.length === 0 && (
        <p className="pt-1 text-quiet text-sm">
          No single resistor betters it: neither one step of its series nor a value of E192 on the way there.
        </p>
      )}
    </div>
  );
}

const figuresOf = ({ centringError, assured }: BetterValueTableProps["present"]) => ({
  centring: formatPercent(centringError),
  assured: formatQuantity(assured, "V"),
});

function TryButton({ resistor, value, onTry }: BetterValue & { onTry: () => void }) {
  const { resistances } = usePreferences();
  const name = resistor.toUpperCase();
  const marking = formatResistance(value, resistances);
  return (
    <button
      type="button"
      aria-label={`Try ${name} ${marking}`}
      onClick={onTry}
      className="py-0.5 underline decoration-edge underline-offset-3 hover:decoration-ink"
    >
      {name} <span className="value">{marking}</span>
    </button>
  );
}
