import type { ReactNode } from "react";
import { Icon } from "./icon";

type StepperProps = {
  /** What is stepped: "R1". */
  label: string;
  /** The value as shown now. */
  value: ReactNode;
  /** The neighbours in the series as shown; null at the end of the series. */
  lower: string | null;
  higher: string | null;
  onStep: (direction: "lower" | "higher") => void;
  disabled?: boolean;
};

/** One preferred value down, one up, with both neighbours in sight. */
export function Stepper({ label, value, lower, higher, onStep, disabled = false }: StepperProps) {
  return (
    <fieldset
      disabled={disabled}
      className="grid grid-cols-[2.75rem_auto_1fr_auto_7.5rem] print:grid-cols-[2.75rem_1fr] items-center gap-x-2 border-rule border-b py-1"
    >
      <legend className="sr-only">{label}</legend>
      <span aria-hidden="true" className="font-medium">
        {label}
      </span>
      <StepButton direction="lower" label={label} to={lower} onStep={onStep} />
      <output aria-live="polite" className="value text-center text-lg print:text-right">
        {value}
      </output>
      <StepButton direction="higher" label={label} to={higher} onStep={onStep} />
      <span aria-hidden="true" data-no-print="" className="value text-right text-quiet text-sm">
        {lower ?? "—"} · {higher ?? "—"}
      </span>
    </fieldset>
  );
}

type StepButtonProps = {
  direction: "lower" | "higher";
  label: string;
  to: string | null;
  onStep: StepperProps["onStep"];
};

function StepButton({ direction, label, to, onStep }: StepButtonProps) {
  return (
    <button
      type="button"
      data-no-print=""
      disabled={to === null}
      aria-label={to === null ? `${label} has no ${direction} value` : `${label} ${direction}, to ${to}`}
      onClick={() => onStep(direction)}
      className={
        "inline-flex h-6.5 w-7.5 items-center justify-center rounded-md border border-rule bg-raised text-sm " +
        "hover:border-edge disabled:opacity-40"
      }
    >
      <Icon name={direction === "lower" ? "chevron-left" : "chevron-right"} />
    </button>
  );
}
