import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { type FieldErrors, type UseFormReturn, useForm } from "react-hook-form";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import type { CircuitName } from "#shared/schemas/circuit";
import { adaptBrief, isOffered } from "./adapt-brief";

export type BriefForm = UseFormReturn<Brief, unknown, Brief>;

/** What the fields are called where an error is told apart from its field. */
const NAMES: Record<string, string> = {
  "rail.volts": "Rail",
  "rail.negative": "Negative rail",
  "rail.tolerance": "Rail tolerance",
  circuit: "Circuit",
  sourceResistor: "Source resistor",
  "load.ohms": "Load",
  "swing.peak": "Swing",
  "ambient.min": "Lowest temperature",
  "ambient.max": "Highest temperature",
  "resistors.tolerance": "Resistor tolerance",
  "gain.min": "Least gain",
  "gain.max": "Greatest gain",
  "inputResistance.min": "Input resistance",
  "supplyCurrent.max": "Supply current",
  "lowCorner.hertz": "Low corner",
  "highCorner.min": "High corner",
  "distortion.max": "Second harmonic",
  "distortion.atPeak": "Output peak for the second harmonic",
  "sourceDrop.min": "Drop across RS",
  "source.ohms": "Source impedance",
  "resistors.divider.min": "Smallest divider value",
  "resistors.divider.max": "Largest divider value",
  "resistors.drain.min": "Smallest drain resistor",
  "resistors.drain.max": "Largest drain resistor",
  "resistors.source.min": "Smallest source resistor",
  "resistors.source.max": "Largest source resistor",
  "derating.vds": "Drain-source derating",
  "derating.power": "Power derating",
  "derating.resistorPower": "Resistor derating",
  "parts.maxUnitPrice": "Highest price",
  buildQuantity: "Build quantity",
};

/**
 * The form of a brief, with every complaint by its field's name.
 *
 * @param brief what the form starts from; when it changes (one goes back with the browser), the form follows
 */
export function useBriefForm(brief: Brief) {
  const form: BriefForm = useForm<Brief, unknown, Brief>({
    resolver: zodResolver(briefSchema) as never,
    defaultValues: brief,
    values: brief,
    mode: "onChange",
  });
  const [unreadable, setUnreadable] = useState<Record<string, string>>({});
  const onUnreadable = (path: string, message: string | null) =>
    setUnreadable(({ [path]: _old, ...rest }) => (message === null ? rest : { ...rest, [path]: message }));
  const chooseCircuit = (circuit: CircuitName) => {
    const adapted = adaptBrief(form.getValues(), circuit);
    form.reset(adapted, { keepDefaultValues: true });
    setUnreadable((old) =>
      Object.fromEntries(Object.entries(old).filter(([path]) => isOffered(path, adapted))),
    );
    void form.trigger();
  };
  const complaints = { ...errorsByPath(form.formState.errors), ...unreadable };
  return {
    form,
    onUnreadable,
    chooseCircuit,
    isUnreadable: Object.keys(unreadable).length > 0,
    complaints: Object.entries(complaints).map(([path, message]) => ({
      path,
      name: NAMES[path] ?? path,
      message,
    })),
  };
}

/** Flattens the form's tree of errors. */
function errorsByPath(errors: FieldErrors, prefix = ""): Record<string, string> {
  const found: Record<string, string> = {};
  for (const [key, error] of Object.entries(errors)) {
    if (!error || key === "ref") continue;
    const path = `${prefix}${key}`;
    if (typeof error.message === "string") found[path] = error.message;
    else Object.assign(found, errorsByPath(error as FieldErrors, `${path}.`));
  }
  return found;
}
