import type { ChangeEvent, ComponentProps } from "react";
import { classNames } from "./class-names";
import { CONTROL_BOX, useFieldControl } from "./field";
import { Icon } from "./icon";

export type SelectOption<T extends string> = { value: T; label: string; disabled?: boolean };

type SelectProps<T extends string> = Omit<ComponentProps<"select">, "value"> & {
  options: readonly SelectOption<T>[];
  value?: T | "";
  onValueChange?: (value: T) => void;
  /** Shown first, with an empty value. */
  placeholder?: string;
};

/** The platform's own list of choices, in our clothes; works with `register` of a form too. */
export function Select<T extends string>({
  options,
  onValueChange,
  onChange,
  placeholder,
  className,
  ...rest
}: SelectProps<T>) {
  const control = useFieldControl(rest);
  const change = (event: ChangeEvent<HTMLSelectElement>) => {
    onChange?.(event);
    const chosen = options.find((option) => option.value === event.target.value);
    if (chosen) onValueChange?.(chosen.value);
  };
  return (
    <span className={classNames("relative inline-flex w-full", className)}>
      <select
        {...rest}
        {...control}
        onChange={change}
        className={classNames(CONTROL_BOX, "appearance-none pr-8")}
      >
        {placeholder !== undefined && <option value="">{placeholder}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
      <Icon name="chevron-down" className="pointer-events-none absolute top-1/2 right-2.5 -translate-y-1/2" />
    </span>
  );
}
