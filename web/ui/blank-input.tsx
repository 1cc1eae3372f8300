import type { ChangeEvent, ReactNode } from "react";
import { classNames } from "./class-names";
import type { SelectOption } from "./select";
import { type QuantityTextOptions, useQuantityText } from "./use-quantity-text";

const BLANK =
  "value rounded-t-sm border-ink border-b-[1.5px] bg-panel px-2 leading-tight text-[0.85em] text-ink " +
  "hover:bg-rule/50 aria-invalid:border-caution aria-invalid:border-dashed aria-invalid:text-caution-ink";

type BlankInputProps = QuantityTextOptions & {
  /** What the blank is, since the sentence around it is no label: "Rail". */
  label: string;
  /** A refusal from elsewhere (the form); its words stand under the sentence, in the element with `errorId`. */
  error?: string | null;
  errorId?: string;
  /** Shown while empty. */
  placeholder?: string;
  /** Punctuation that follows, kept on the same line. */
  after?: string;
};

/** A blank in a sentence, filled in with a quantity; as wide as what stands in it. */
export function BlankInput(props: BlankInputProps) {
  const { label, error, errorId, placeholder = "", after, ...options } = props;
  const quantity = useQuantityText(options);
  const invalid = Boolean(error || quantity.error);
  const length = Math.max(2, (quantity.text || placeholder).length);
  const blank = (
    <input
      type="text"
      autoComplete="off"
      spellCheck={false}
      aria-label={label}
      aria-invalid={invalid || undefined}
      aria-describedby={invalid ? errorId : undefined}
      placeholder={placeholder}
      title={quantity.error ?? undefined}
      {...quantity.inputProps}
      className={BLANK}
      // Mono, so the length in characters is the width; plus the padding.
      style={{ width: `calc(${length}ch + 1rem)` }}
    />
  );
  return <WithPunctuation after={after}>{blank}</WithPunctuation>;
}

function WithPunctuation({ after, children }: { after: string | undefined; children: ReactNode }) {
  return (
    <span className="whitespace-nowrap">
      {children}
      {after}
    </span>
  );
}

type BlankSelectProps<T extends string> = {
  label: string;
  options: readonly SelectOption<T>[];
  value: T;
  onChange: (value: T) => void;
  error?: string | null;
  errorId?: string;
  after?: string;
};

/** A blank in a sentence, filled in from a list; as wide as the choice. */
export function BlankSelect<T extends string>(props: BlankSelectProps<T>) {
  const { label, options, value, onChange, error, errorId, after } = props;
  const chosen = options.find((option) => option.value === value);
  const choose = (event: ChangeEvent<HTMLSelectElement>) => {
    const option = options.find((candidate) => candidate.value === event.target.value);
    if (option) onChange(option.value);
  };
  const blank = (
    <select
      aria-label={label}
      aria-invalid={error ? true : undefined}
      aria-describedby={error ? errorId : undefined}
      value={value}
      onChange={choose}
      className={classNames(BLANK, "max-w-full appearance-none text-ellipsis")}
      style={{ width: `calc(${(chosen?.label ?? value).length}ch + 1rem)` }}
    >
      {options.map((option) => (
        <option key={option.value} value={option.value} disabled={option.disabled}>
          {option.label}
        </option>
      ))}
    </select>
  );
  return <WithPunctuation after={after}>{blank}</WithPunctuation>;
}
