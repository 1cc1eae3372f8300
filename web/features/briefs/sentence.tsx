import { type Control, Controller, type FieldPath, useWatch } from "react-hook-form";
import type { Brief } from "#shared/schemas/brief";
import { SERIES_NAMES, type SeriesName } from "#shared/values/e-series";
import type { Unit } from "#shared/values/units";
import { BlankInput, BlankSelect } from "../../ui/blank-input";
import type { BriefForm } from "./use-brief-form";

type SentenceProps = {
  form: BriefForm;
  errorId: string;
  onUnreadable: (path: string, message: string | null) => void;
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
export function Sentence({ form, errorId, onUnreadable }: SentenceProps) {
  const shared = { control: form.control, errorId, onUnreadable };
  return (
    <p className="max-w-[68rem] text-2xl">
      On a <Blank {...shared} name="rail.volts" label="Rail" unit="V" /> rail, give or take{" "}
      <Blank {...shared} name="rail.tolerance" label="Rail tolerance" unit="%" after="," /> drive{" "}
      <Blank {...shared} name="load.ohms" label="Load" unit="Ω" optional placeholder="no load" /> through a
      capacitor with at least <Blank {...shared} name="swing.peak" label="Swing" unit="V" /> peak, from{" "}
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
          onChange={field.onChange}
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

/** One series for all resistors; "mixed" once they have been set apart among the conditions. */
function SeriesBlank({ form, errorId }: { form: BriefForm; errorId: string }) {
  const { divider, drain, source } = useWatch({ control: form.control, name: "resistors" });
  const alike = divider.series === drain.series && drain.series === source.series;
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
      value={alike ? divider.series : "mixed"}
      onChange={choose}
      errorId={errorId}
    />
  );
}
