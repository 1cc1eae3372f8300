import { RadioGroup } from "radix-ui";
import { type ReactNode, useId } from "react";
import { classNames } from "./class-names";

export type SegmentedOption<T extends string> = { value: T; label: ReactNode; disabled?: boolean };

type SegmentedProps<T extends string> = {
  /** What is being chosen; read out, and shown before the choices unless hidden. */
  label: string;
  labelHidden?: boolean;
  options: readonly SegmentedOption<T>[];
  value: T;
  onChange: (value: T) => void;
  className?: string;
};

/** One of a few, side by side: plain words, the chosen one underlined. Arrow keys move the choice. */
export function Segmented<T extends string>({
  label,
  labelHidden = false,
  options,
  value,
  onChange,
  className,
}: SegmentedProps<T>) {
  const labelId = useId();
  const choose = (next: string) => {
    const option = options.find((candidate) => candidate.value === next);
    if (option) onChange(option.value);
  };
  return (
    <div className={classNames("inline-flex flex-wrap items-baseline gap-x-4.5 gap-y-1", className)}>
      <span id={labelId} className={labelHidden ? "sr-only" : undefined}>
        {label}
      </span>
      <RadioGroup.Root
        value={value}
        onValueChange={choose}
        aria-labelledby={labelId}
        orientation="horizontal"
        className="inline-flex flex-wrap items-baseline gap-x-4.5 gap-y-1"
      >
        {options.map((option) => (
          <RadioGroup.Item
            key={option.value}
            value={option.value}
            disabled={option.disabled}
            className={classNames(
              "border-transparent border-b-2 pb-px text-quiet hover:text-ink",
              "data-[state=checked]:border-ink data-[state=checked]:text-ink",
              "data-[disabled]:cursor-not-allowed data-[disabled]:opacity-50",
            )}
          >
            {option.label}
          </RadioGroup.Item>
        ))}
      </RadioGroup.Root>
    </div>
  );
}
