import { Popover as RadixPopover } from "radix-ui";
import type { ReactNode } from "react";
import { classNames } from "./class-names";

type PopoverProps = {
  /** The one button that opens it. */
  trigger: ReactNode;
  /** Names the panel for a screen reader. */
  label: string;
  children: ReactNode;
  align?: "start" | "center" | "end";
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  className?: string;
};

/** A small panel beside its button for what doesn't fit the line. Escape or a click outside closes it. */
export function Popover({
  trigger,
  label,
  children,
  align = "start",
  open,
  onOpenChange,
  className,
}: PopoverProps) {
  return (
    <RadixPopover.Root open={open} onOpenChange={onOpenChange}>
      <RadixPopover.Trigger asChild>{trigger}</RadixPopover.Trigger>
      <RadixPopover.Portal>
        <RadixPopover.Content
          aria-label={label}
          align={align}
          sideOffset={6}
          collisionPadding={8}
          className={classNames(
            "z-50 max-h-(--radix-popover-content-available-height) w-80 max-w-[calc(100vw-1rem)] overflow-y-auto",
            "rounded-md border border-rule bg-raised p-4 shadow-float",
            className,
          )}
        >
          {children}
        </RadixPopover.Content>
      </RadixPopover.Portal>
    </RadixPopover.Root>
  );
}
