import { type ComponentProps, type ReactNode, useId } from "react";
import { classNames } from "./class-names";

type CheckboxProps = Omit<ComponentProps<"input">, "type" | "children"> & {
  label: ReactNode;
  hint?: ReactNode;
};

/** A box to tick, with its words beside it as the label. */
export function Checkbox({ label, hint, className, id, ...rest }: CheckboxProps) {
  const ownId = useId();
  const inputId = id ?? ownId;
  const hintId = `${inputId}-hint`;
  return (
    <div className={classNames("flex items-start gap-2.5", className)}>
      <span className="relative mt-[3px] inline-flex size-4.5 shrink-0">
        <input
          type="checkbox"
          id={inputId}
          aria-describedby={hint ? hintId : undefined}
          {...rest}
          className={classNames(
            "peer size-4.5 appearance-none rounded-sm border border-edge bg-raised",
            "checked:border-ink checked:bg-ink disabled:opacity-50",
          )}
        />
        <svg
          viewBox="0 0 16 16"
          aria-hidden="true"
          fill="none"
          strokeWidth="2"
          className="pointer-events-none absolute inset-0.5 hidden stroke-paper peer-checked:block"
        >
          <path d="M3 8.5l3.5 3.5L13 4.5" strokeLinecap="round" strokeLinejoin="round" />
        </svg>
      </span>
      <span>
        <label htmlFor={inputId}>{label}</label>
        {hint && (
          <span id={hintId} className="block text-quiet text-xs">
            {hint}
          </span>
        )}
      </span>
    </div>
  );
}
