import type { ComponentProps } from "react";
import { classNames } from "./class-names";
import { CONTROL_BOX, useFieldControl } from "./field";

type TextInputProps = ComponentProps<"input"> & {
  /** Sets figures in mono, aligned right. */
  numeric?: boolean;
};

/** A one-line text box; inside a `Field` it takes its label, hint and error. */
export function TextInput({ className, numeric = false, ...rest }: TextInputProps) {
  const control = useFieldControl(rest);
  return (
    <input
      type="text"
      {...rest}
      {...control}
      className={classNames(CONTROL_BOX, numeric && "value text-right", className)}
    />
  );
}

/** A text box of several lines that grows with its words where the browser can. */
export function TextArea({ className, rows = 3, ...rest }: ComponentProps<"textarea">) {
  const control = useFieldControl(rest);
  return (
    <textarea
      rows={rows}
      {...rest}
      {...control}
      className={classNames(CONTROL_BOX, "field-sizing-content py-1.5", className)}
    />
  );
}
