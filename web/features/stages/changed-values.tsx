import type { Resistors } from "#shared/schemas/circuit";
import { formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { Button } from "../../ui/button";

type ChangedValuesProps = {
  kept: Resistors;
  now: Resistors;
  onBack: () => void;
  /** Null for whoever may only try. */
  onKeep: (() => void) | null;
  busy: boolean;
};

/** Says which values differ from those kept, and offers both ways out. */
export function ChangedValues({ kept, now, onBack, onKeep, busy }: ChangedValuesProps) {
  const { resistances } = usePreferences();
  const names = (Object.keys(kept) as (keyof Resistors)[]).filter((name) => kept[name] !== now[name]);
  if (names.length === 0) return null;
  const show = (ohms: number) => formatResistance(ohms, resistances);
  return (
    <div className="mt-3 border-edge border-l-3 bg-panel px-3.5 py-2 text-sm">
      <p>
        Changed from what is kept:{" "}
        {names.map((name, index) => (
          <span key={name} className="value">
            {index > 0 && ", "}
            {name.toUpperCase()} {show(kept[name])} → {show(now[name])}
          </span>
        ))}
      </p>
      <div data-no-print="" className="mt-2 flex flex-wrap gap-3">
        {onKeep && (
          <Button size="small" busy={busy} onClick={onKeep}>
            Keep these values
          </Button>
        )}
        <Button size="small" variant="quiet" onClick={onBack}>
          Back to the kept ones
        </Button>
      </div>
    </div>
  );
}
