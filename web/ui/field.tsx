import { createContext, type ReactNode, useContext, useId } from "react";
import { classNames } from "./class-names";
import { Icon } from "./icon";

type FieldContextValue = { id: string; describedBy: string | undefined; invalid: boolean; required: boolean };

const FieldContext = createContext<FieldContextValue | null>(null);

type FieldProps = {
  label: ReactNode;
  /** A short line under the control that says what goes in. */
  hint?: ReactNode;
  /** What is wrong and what to do; tied to the control and announced. */
  error?: string | null;
  required?: boolean;
  /** Hides the label from sight, not from a screen reader. */
  labelHidden?: boolean;
  className?: string;
  children: ReactNode;
};

/** A labelled control: label above, hint and error below, all tied together for assistive technology. */
export function Field({
  label,
  hint,
  error,
  required = false,
  labelHidden = false,
  className,
  children,
}: FieldProps) {
  const id = useId();
  const hintId = `${id}-hint`;
  const errorId = `${id}-error`;
  const describedBy = [error ? errorId : null, hint ? hintId : null].filter(Boolean).join(" ") || undefined;
  return (
    <FieldContext value={{ id, describedBy, invalid: Boolean(error), required }}>
      <div className={classNames("flex flex-col gap-1", className)}>
        <label htmlFor={id} className={labelHidden ? "sr-only" : "font-medium text-sm"}>
          {label}
        </label>
        {children}
        {error && <FieldError id={errorId}>{error}</FieldError>}
        {hint && (
          <p id={hintId} className="text-quiet text-xs">
            {hint}
          </p>
        )}
      </div>
    </FieldContext>
  );
}

/** The words of an error, with a mark, so that colour is never the only sign. */
export function FieldError({ id, children }: { id?: string; children: ReactNode }) {
  return (
    <p id={id} role="alert" className="flex items-baseline gap-1.5 text-caution-ink text-sm">
      <Icon name="caution" className="relative top-0.5" />
      <span>{children}</span>
    </p>
  );
}

type ControlAria = {
  id?: string;
  "aria-describedby"?: string;
  "aria-invalid"?: boolean | "true" | "false" | "grammar" | "spelling";
  required?: boolean;
};

/** What a control inside a `Field` must carry; its own props win. */
export function useFieldControl(own: ControlAria = {}): ControlAria {
  const field = useContext(FieldContext);
  if (field === null) return own;
  const describedBy = [own["aria-describedby"], field.describedBy].filter(Boolean).join(" ");
  return {
    id: own.id ?? field.id,
    "aria-describedby": describedBy || undefined,
    "aria-invalid": own["aria-invalid"] ?? (field.invalid || undefined),
    required: own.required ?? (field.required || undefined),
  };
}

/** The look of a boxed control, shared by text boxes and selects. */
export const CONTROL_BOX =
  "min-h-9 w-full rounded-md border border-edge bg-raised px-2.5 py-1 text-base text-ink " +
  "aria-invalid:border-caution aria-invalid:ring-1 aria-invalid:ring-caution " +
  "disabled:cursor-not-allowed disabled:bg-panel disabled:text-quiet";
