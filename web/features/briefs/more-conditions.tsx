import type { ReactNode } from "react";
import { Controller, type FieldPath, useWatch } from "react-hook-form";
import { circuitOf } from "#shared/bias/circuits/registry";
import type { Brief } from "#shared/schemas/brief";
import { SERIES_NAMES, type SeriesName } from "#shared/values/e-series";
import type { Unit } from "#shared/values/units";
import { type RangeName, rangesOf, resistorsInWords, sourceInWords } from "../../lib/circuit-words";
import { Checkbox } from "../../ui/checkbox";
import { Field } from "../../ui/field";
import { QuantityInput } from "../../ui/quantity-input";
import { Select } from "../../ui/select";
import { ListInput } from "./list-input";
import type { BriefForm } from "./use-brief-form";

type ConditionsProps = { form: BriefForm; onUnreadable: (path: string, message: string | null) => void };

/** The rest of the brief as a form, in groups. */
export function MoreConditions(props: ConditionsProps) {
  const [circuit, sourceResistor] = useWatch({
    control: props.form.control,
    name: ["circuit", "sourceResistor"],
  });
  const treatments = circuitOf(circuit).sourceResistors;
  return (
    <div className="grid gap-x-12 gap-y-8 border-rule border-t pt-6 sm:grid-cols-2 lg:grid-cols-3">
      <Group title="What the stage must do">
        <Quantity {...props} name="gain.min" label="Least gain" unit="" />
        <Quantity {...props} name="gain.max" label="Greatest gain" unit="" />
        <Quantity {...props} name="inputResistance.min" label="Input resistance, at least" unit="Ω" />
        <Quantity {...props} name="supplyCurrent.max" label="Supply current, at most" unit="A" />
        <Quantity {...props} name="distortion.max" label="Second harmonic, at most" unit="%" />
        <Quantity
          {...props}
          name="distortion.atPeak"
          label="at an output peak of"
          unit="V"
          empty="the swing"
        />
      </Group>
      <Group title="Signal and source">
        <Quantity {...props} name="source.ohms" label="Source impedance" unit="Ω" required />
        <Quantity {...props} name="lowCorner.hertz" label="Low corner" unit="Hz" required />
        <Quantity {...props} name="highCorner.min" label="High corner, at least" unit="Hz" />
        {treatments.length > 1 && (
          <Choice
            {...props}
            name="sourceResistor"
            label="Source resistor"
            options={treatments.map((value) => ({ value, label: TREATMENTS[value] }))}
          />
        )}
        <Quantity
          {...props}
          name="sourceDrop.min"
          label={`Drop across ${sourceInWords({ circuit, sourceResistor })}, at least`}
          unit="V"
        />
      </Group>
      <Group title="Device">
        <Choice
          {...props}
          name="polarity"
          label="Polarity"
          options={[
            { value: "n", label: "N-channel" },
            { value: "p", label: "P-channel" },
            { value: "either", label: "Either" },
          ]}
        />
        <Choice
          {...props}
          name="parts.mounting"
          label="Mounting"
          placeholder="Either"
          options={[
            { value: "surface", label: "Surface mount" },
            { value: "through-hole", label: "Through-hole" },
          ]}
        />
        <List {...props} name="parts.packages" label="Packages" />
        <List {...props} name="parts.makers" label="Makers" />
        <Tick {...props} name="parts.stockedOnly" label="Only parts in stock" />
      </Group>
      <Group title="Resistors">
        {rangesOf({ circuit, sourceResistor }).map(({ range, resistors }) => (
          <Range key={range} {...props} range={range} label={resistorsInWords(resistors)} />
        ))}
        <Tick {...props} name="resistors.stockedOnly" label="Only values in stock" />
      </Group>
      <Group title="Derating">
        <Quantity {...props} name="derating.vds" label="Rail, of the drain-source rating" unit="%" required />
        <Quantity {...props} name="derating.power" label="Dissipation, of the rating" unit="%" required />
        <Quantity
          {...props}
          name="derating.resistorPower"
          label="Resistors, of their rating"
          unit="%"
          required
        />
      </Group>
      <Group title="Buying">
        <Quantity {...props} name="buildQuantity" label="Build quantity" unit="" required />
        <Price {...props} />
      </Group>
    </div>
  );
}

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <fieldset className="flex min-w-0 flex-col gap-3.5">
      <legend className="mb-3 font-semibold">{title}</legend>
      {children}
    </fieldset>
  );
}

type QuantityProps = ConditionsProps & {
  name: FieldPath<Brief>;
  label: string;
  unit: Unit;
  /** Empty is no answer. */
  required?: boolean;
  /** What an empty box stands for. */
  empty?: string;
};

function Quantity(props: QuantityProps) {
  const { form, onUnreadable, name, label, unit, required = false, empty = "no limit" } = props;
  return (
    <Controller
      control={form.control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} error={fieldState.error?.message}>
          <QuantityInput
            unit={unit}
            value={typeof field.value === "number" ? field.value : null}
            onChange={(value) => field.onChange(value ?? undefined)}
            optional={!required}
            placeholder={required ? undefined : empty}
            onUnreadable={(message) => onUnreadable(name, message)}
          />
        </Field>
      )}
    />
  );
}

/** A price is typed in dollars and kept in cents. */
function Price({ form, onUnreadable }: ConditionsProps) {
  return (
    <Controller
      control={form.control}
      name="parts.maxUnitPrice"
      render={({ field, fieldState }) => (
        <Field label="Transistor, at most ($ each)" error={fieldState.error?.message}>
          <QuantityInput
            unit=""
            value={field.value === undefined ? null : field.value / 100}
            onChange={(value) => field.onChange(value === null ? undefined : Math.round(value * 100))}
            optional
            placeholder="no limit"
            onUnreadable={(message) => onUnreadable("parts.maxUnitPrice", message)}
          />
        </Field>
      )}
    />
  );
}

type ChoiceProps<T extends string> = ConditionsProps & {
  name: FieldPath<Brief>;
  label: string;
  options: readonly { value: T; label: string }[];
  placeholder?: string;
};

function Choice<T extends string>({ form, name, label, options, placeholder }: ChoiceProps<T>) {
  return (
    <Controller
      control={form.control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} error={fieldState.error?.message}>
          <Select
            options={options}
            placeholder={placeholder}
            value={(field.value as T | undefined) ?? ""}
            onChange={(event) => field.onChange(event.target.value || undefined)}
          />
        </Field>
      )}
    />
  );
}

const TREATMENTS: Record<Brief["sourceResistor"], string> = {
  bypassed: "Bypassed",
  unbypassed: "Not bypassed",
  none: "None",
};

type TickProps = ConditionsProps & { name: "parts.stockedOnly" | "resistors.stockedOnly"; label: string };

function Tick({ form, name, label }: TickProps) {
  return <Checkbox label={label} {...form.register(name)} />;
}

type ListProps = ConditionsProps & { name: "parts.packages" | "parts.makers"; label: string };

function List({ form, name, label }: ListProps) {
  return (
    <Controller
      control={form.control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} hint="Separate with commas; empty takes all" error={fieldState.error?.message}>
          <ListInput value={field.value} onChange={field.onChange} />
        </Field>
      )}
    />
  );
}

const SERIES_OPTIONS = SERIES_NAMES.map((name) => ({ value: name as SeriesName, label: name as string }));

/** Series, smallest and largest value of one kind of resistor, on one line. */
function Range(props: ConditionsProps & { range: RangeName; label: string }) {
  const { range, label, ...rest } = props;
  return (
    <fieldset aria-label={label} className="grid grid-cols-[5.5rem_1fr_1fr] gap-2">
      <Choice {...rest} name={`resistors.${range}.series`} label={label} options={SERIES_OPTIONS} />
      <Quantity {...rest} name={`resistors.${range}.min`} label="from" unit="Ω" required />
      <Quantity {...rest} name={`resistors.${range}.max`} label="to" unit="Ω" required />
    </fieldset>
  );
}
