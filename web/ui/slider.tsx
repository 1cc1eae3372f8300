import { Slider as RadixSlider } from "radix-ui";
import { useId } from "react";

type SliderProps = {
  label: string;
  value: number;
  onChange: (value: number) => void;
  min: number;
  max: number;
  step?: number;
  /** A value to find again, marked by a tick across the track. */
  mark?: number;
  /** The value in words, with its unit: shown at the right and read out. */
  format: (value: number) => string;
};

/** A value along a range, such as a temperature: arrow keys step, Page Up and Down step ten times as far. */
export function Slider({ label, value, onChange, min, max, step = 1, mark, format }: SliderProps) {
  const labelId = useId();
  return (
    <div className="flex flex-col gap-1">
      <div className="flex items-baseline justify-between gap-4">
        <span id={labelId} className="text-quiet">
          {label}
        </span>
        <output className="value text-sm">{format(value)}</output>
      </div>
      <RadixSlider.Root
        value={[value]}
        onValueChange={([next]) => onChange(next)}
        min={min}
        max={max}
        step={step}
        className="relative flex h-6 touch-none select-none items-center"
      >
        {mark !== undefined && mark >= min && mark <= max && (
          <span
            aria-hidden="true"
            className="absolute h-3 w-px bg-edge"
            style={{ left: leftOf((mark - min) / (max - min)) }}
          />
        )}
        <RadixSlider.Track className="relative h-px grow bg-edge">
          <RadixSlider.Range className="absolute -top-px h-[3px] bg-ink" />
        </RadixSlider.Track>
        <RadixSlider.Thumb
          aria-labelledby={labelId}
          aria-valuetext={format(value)}
          className="block size-4.5 rounded-full border-2 border-ink bg-raised"
        />
      </RadixSlider.Root>
    </div>
  );
}

/** Where the thumb's middle stands: it stays inside the track's ends, so half its 18 px is kept at either side. */
function leftOf(fraction: number): string {
  return `calc(${100 * fraction}% + ${9 - 18 * fraction}px)`;
}
