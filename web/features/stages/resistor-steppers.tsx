import { circuitOf } from "#shared/bias/circuits/registry";
import type { Brief } from "#shared/schemas/brief";
import { type ResistorKey, type Resistors, resistorsOf } from "#shared/schemas/circuit";
import { stepInSeries } from "#shared/values/e-series";
import { formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { Stepper } from "../../ui/stepper";

type ResistorSteppersProps = {
  brief: Brief;
  resistors: Resistors;
  onChange: (resistors: Resistors) => void;
};

/** Each resistor with its neighbours in its own series, one step away. */
export function ResistorSteppers({ brief, resistors, onChange }: ResistorSteppersProps) {
  const { resistances } = usePreferences();
  const show = (ohms: number) => formatResistance(ohms, resistances);
  const { ranges } = circuitOf(brief.circuit);
  const names = resistorsOf(brief.circuit).filter((name) => resistors[name] > 0);
  const seriesOf = (name: ResistorKey) => brief.resistors[ranges[name] ?? "divider"].series;
  const series = [...new Set(names.map(seriesOf))];
  return (
    <section aria-labelledby="resistors-title">
      <h2 id="resistors-title" className="pb-1 font-semibold text-sm">
        Resistors, one step in {series.join(" and ")}
      </h2>
      {names.map((name) => {
        const own = seriesOf(name);
        const value = resistors[name];
        const lower = stepInSeries(own, value, -1);
        const higher = stepInSeries(own, value, 1);
        return (
          <Stepper
            key={name}
            label={name.toUpperCase()}
            value={show(value)}
            lower={lower >= LEAST ? show(lower) : null}
            higher={higher <= MOST ? show(higher) : null}
            onStep={(direction) => onChange({ ...resistors, [name]: direction === "lower" ? lower : higher })}
          />
        );
      })}
    </section>
  );
}

/** The values that a stage may have, ohms. */
const LEAST = 0.1;
const MOST = 100e6;
