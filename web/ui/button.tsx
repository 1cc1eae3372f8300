import { Slot } from "radix-ui";
import type { ComponentProps, MouseEvent } from "react";
import { classNames } from "./class-names";
import { Spinner } from "./spinner";

const VARIANTS = {
  main: "rounded-md border border-ember bg-ember font-semibold text-on-ember hover:brightness-93",
  plain: "rounded-md border border-ink bg-raised font-medium text-ink hover:bg-panel",
  quiet: "rounded-md border border-transparent bg-transparent text-ink hover:bg-panel",
  link: "text-quiet underline decoration-1 underline-offset-3 hover:text-ink",
} as const;

const SIZES = {
  regular: "min-h-9 px-4 py-1.5 text-base",
  small: "min-h-7 px-2.5 py-0.5 text-sm",
} as const;

export type ButtonProps = ComponentProps<"button"> & {
  /** `main` is the one ember action of a page. */
  variant?: keyof typeof VARIANTS;
  size?: keyof typeof SIZES;
  /** Gives the look to the one child (a router link) instead of rendering a button. */
  asChild?: boolean;
  /** Work is under way: keeps its place and focus, says so, and ignores clicks. */
  busy?: boolean;
};

/** A button in one of four weights; `type` is "button" unless said otherwise. */
export function Button({
  variant = "plain",
  size = "regular",
  asChild = false,
  busy = false,
  className,
  children,
  onClick,
  ...rest
}: ButtonProps) {
  const Element = asChild ? Slot.Root : "button";
  const refuseWhileBusy = (event: MouseEvent<HTMLButtonElement>) => {
    if (busy) event.preventDefault();
    else onClick?.(event);
  };
  return (
    <Element
      {...(asChild ? {} : { type: "button" as const })}
      {...rest}
      onClick={refuseWhileBusy}
      aria-busy={busy || undefined}
      aria-disabled={busy || rest["aria-disabled"]}
      className={classNames(
        "inline-flex items-center justify-center gap-2 whitespace-nowrap transition-colors duration-100",
        "disabled:cursor-not-allowed disabled:opacity-50 aria-disabled:cursor-progress",
        VARIANTS[variant],
        variant !== "link" && SIZES[size],
        variant === "link" && size === "small" && "text-sm",
        className,
      )}
    >
      {busy && <Spinner />}
      <Slot.Slottable>{children}</Slot.Slottable>
    </Element>
  );
}
