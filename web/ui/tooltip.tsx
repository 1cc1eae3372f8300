import { Tooltip as RadixTooltip } from "radix-ui";
import type { ReactNode } from "react";

type TooltipProps = {
  content: ReactNode;
  /** The one focusable element it explains. */
  children: ReactNode;
  side?: "top" | "right" | "bottom" | "left";
};

/** A few words on hover and on focus; never the only place where something is said. */
export function Tooltip({ content, children, side = "top" }: TooltipProps) {
  return (
    <RadixTooltip.Provider delayDuration={300}>
      <RadixTooltip.Root>
        <RadixTooltip.Trigger asChild>{children}</RadixTooltip.Trigger>
        <RadixTooltip.Portal>
          <RadixTooltip.Content
            side={side}
            sideOffset={5}
            collisionPadding={8}
            className="z-50 max-w-72 rounded-sm bg-ink px-2.5 py-1.5 text-paper text-sm shadow-float"
          >
            {content}
          </RadixTooltip.Content>
        </RadixTooltip.Portal>
      </RadixTooltip.Root>
    </RadixTooltip.Provider>
  );
}
