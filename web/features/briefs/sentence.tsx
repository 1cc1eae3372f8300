import { type Control, Controller, type FieldPath, useWatch } from "react-hook-form";
import type { Brief } from "#shared/schemas/brief";
import { CIRCUITS, type CircuitName } from "#shared/schemas/circuit";
import { SERIES_NAMES, type SeriesName } from "#shared/values/e-series";
import { formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";
import { circuitInWords, rangesOf } from "../../lib/circuit-words";
import { BlankInput, BlankSelect } from "../../ui/blank-input";
import type { BriefForm } from "./use-brief-form";

type SentenceProps = {
  form: BriefForm;
  errorId: string;
  onUnreadable: (path: string, message: string | null) => void;
  onCircuit: (circuit: CircuitName) => void;
};

type BlankProps = {
  control: Control<Brief>;
  name: FieldPath<Brief>;
  label: string;
  unit: Unit;
  optional?: boolean;
  placeholder?: string;
  after?: string;
  errorId: string;
  onUnreadable: SentenceProps["onUnreadable"];
};

/** The brief as a sentence, each bracket an input of its own. */
export function Sentence({ form, errorId, onUnreadable, onCircuit }: SentenceProps) {
  const shared = { control: form.control, errorId, onUnreadable };
  const [circuit, volts] = useWatch({ control: form.control, name: ["circuit", "rail.volts"] });
  return (
    <p className="max-w-[68rem] text-2xl">
      On a <Blank {...shared} name="rail.volts" label="Rail" unit="V" /> rail
      {circuit === "negative-rail" && (
        <>
          {" "}
          and{" "}
          <Blank
            {...shared}
            name="rail.negative"
            label="Negative rail"
            unit="V"
            optional
            placeholder={formatQuantity(volts, "V", { exact: true })}
          />{" "}
          below ground
        </>
      )}
      , give or take <Blank {...shared} name="rail.tolerance" label="Rail tolerance" unit="%" after="," />{" "}
      drive <Blank {...shared} name="load.ohms" label="Load" unit="Ω" optional placeholder="no load" />{" "}
      through a capacitor with at least <Blank {...shared} name="swing.peak" label="Swing" unit="V" /> peak in
      a <CircuitBlank circuit={circuit} onCircuit={onCircuit} errorId={errorId} /> stage, from{" "}
      <Blank {...shared} name="ambient.min" label="Lowest temperature" unit="°C" /> to{" "}
      <Blank {...shared} name="ambient.max" label="Highest temperature" unit="°C" after="," /> using{" "}
      <SeriesBlank form={form} errorId={errorId} /> values at{" "}
      <Blank {...shared} name="resistors.tolerance" label="Resistor tolerance" unit="%" after="." />
    </p>
  );
}

function Blank({
  control,
  name,
  label,
  unit,
  optional,
  placeholder,
  after,
  errorId,
  onUnreadable,
}: BlankProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <BlankInput
          label={label}
          unit={unit}
          value={typeof field.value === "number" ? field.value : null}
          // Only the load may be null; any other blank left empty is left out.
          onChange={(value) => field.onChange(value ?? (name === "load.ohms" ? null : undefined))}
          optional={optional}
          placeholder={placeholder}
          after={after}
          error={fieldState.error?.message}
          errorId={errorId}
          onUnreadable={(message) => onUnreadable(name, message)}
        />
      )}
    />
  );
}

const SERIES_OPTIONS = SERIES_NAMES.map((name) => ({
  value: name as SeriesName | "mixed",
  label: name as string,
}));
const MIXED = { value: "mixed" as const, label: "mixed", disabled: true };

const CIRCUIT_OPTIONS = CIRCUITS.map((name) => ({ value: name, label: circuitInWords(name) }));

type CircuitBlankProps = Pick<SentenceProps, "onCircuit" | "errorId"> & { circuit: CircuitName };

function CircuitBlank({ circuit, onCircuit, errorId }: CircuitBlankProps) {
  return (
    <BlankSelect
      label="Circuit"
      options={CIRCUIT_OPTIONS}
      value={circuit}
      onChange={onCircuit}
      errorId={errorId}
    />
  );
}

/** One series for all resistors; "mixed" once they have been set apart among the conditions. */
function SeriesBlank({ form, errorId }: { form: BriefForm; errorId: string }) {
  const [resistors, circuit, sourceResistor] = useWatch({
    control: form.control,
    name: ["resistors", "circuit", "sourceResistor"],
  });
  const used = rangesOf({ circuit, sourceResistor }).map(({ range }) => resistors[range].series);
  const alike = new Set(used).size === 1;
  const choose = (series: SeriesName | "mixed") => {
    if (series === "mixed") return;
    for (const range of ["divider", "drain", "source"] as const) {
      form.setValue(`resistors.${range}.series`, series, { shouldDirty: true });
    }
  };
  return (
    <BlankSelect
      label="Resistor series"
      options={alike ? SERIES_OPTIONS : [MIXED, ...SERIES_OPTIONS]}
      value={alike ? used[0] : "mixed"}
      onChange={choose}
      errorId={errorId}
    />
  );
}
