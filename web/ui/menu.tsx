import { DropdownMenu } from "radix-ui";
import type { ComponentProps, ReactNode } from "react";
import { classNames } from "./class-names";
import { Icon } from "./icon";

type MenuProps = {
  /** The one button that opens it. */
  trigger: ReactNode;
  children: ReactNode;
  align?: "start" | "center" | "end";
};

const ITEM =
  "flex min-h-8 cursor-default select-none items-center gap-2.5 rounded-sm px-2.5 py-1 outline-none " +
  "data-[highlighted]:bg-panel data-[disabled]:text-quiet data-[disabled]:opacity-60";

/** A list of actions under a button; arrow keys move, typing finds, Escape closes. */
export function Menu({ trigger, children, align = "start" }: MenuProps) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content
          align={align}
          sideOffset={4}
          collisionPadding={8}
          className={classNames(
            "z-50 max-h-(--radix-dropdown-menu-content-available-height) min-w-44 overflow-y-auto",
            "rounded-md border border-rule bg-raised p-1 shadow-float",
          )}
        >
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

/** One action, or with `asChild` a link. */
export function MenuItem({ className, ...rest }: ComponentProps<typeof DropdownMenu.Item>) {
  return <DropdownMenu.Item {...rest} className={classNames(ITEM, className)} />;
}

type MenuCheckboxItemProps = {
  checked: boolean;
  onCheckedChange: (checked: boolean) => void;
  disabled?: boolean;
  children: ReactNode;
};

/** A choice that is on or off; the menu stays open so that several can be set. */
export function MenuCheckboxItem({ children, ...rest }: MenuCheckboxItemProps) {
  return (
    <DropdownMenu.CheckboxItem {...rest} onSelect={(event) => event.preventDefault()} className={ITEM}>
      <span className="inline-flex w-4">
        <DropdownMenu.ItemIndicator>
          <Icon name="check" />
        </DropdownMenu.ItemIndicator>
      </span>
      {children}
    </DropdownMenu.CheckboxItem>
  );
}

/** A quiet heading over a group of items. */
export function MenuLabel({ children }: { children: ReactNode }) {
  return (
    <DropdownMenu.Label className="px-2.5 pt-1.5 pb-1 text-quiet text-xs">{children}</DropdownMenu.Label>
  );
}

export function MenuSeparator() {
  return <DropdownMenu.Separator className="my-1 border-rule border-t" />;
}
