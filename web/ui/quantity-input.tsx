import { type ComponentProps, useId } from "react";
import { classNames } from "./class-names";
import { CONTROL_BOX, FieldError, useFieldControl } from "./field";
import { type QuantityTextOptions, useQuantityText } from "./use-quantity-text";

type QuantityInputProps = Omit<ComponentProps<"input">, keyof QuantityTextOptions | "type"> &
  QuantityTextOptions;

/**
 * A text box for a quantity with its unit. Takes "4k7", "4.7 kΩ" or "4700", hands over the SI value when it is left
 * or on Enter, and says so where the text can't be read.
 */
export function QuantityInput(props: QuantityInputProps) {
  const { value, onChange, unit, optional, unitHidden, onStep, onUnreadable, className, ...rest } = props;
  const errorId = useId();
  const quantity = useQuantityText({ value, onChange, unit, optional, unitHidden, onStep, onUnreadable });
  const control = useFieldControl({
    ...rest,
    "aria-describedby": quantity.error ? errorId : rest["aria-describedby"],
    "aria-invalid": quantity.error ? true : rest["aria-invalid"],
  });
  return (
    <>
      <input
        type="text"
        inputMode="text"
        autoComplete="off"
        spellCheck={false}
        {...rest}
        {...control}
        {...quantity.inputProps}
        className={classNames(CONTROL_BOX, "value text-right", className)}
      />
      {quantity.error && <FieldError id={errorId}>{quantity.error}</FieldError>}
    </>
  );
}
