import { Dialog as RadixDialog } from "radix-ui";
import type { ReactNode } from "react";
import { Button } from "./button";
import { classNames } from "./class-names";
import { Icon } from "./icon";

type DialogProps = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: ReactNode;
  description?: ReactNode;
  /** Buttons at the foot, the main one last. */
  footer?: ReactNode;
  size?: "regular" | "wide";
  children?: ReactNode;
};

/**
 * A window over the page that holds the focus until it is closed. The backdrop is our own element and the page is held
 * still by the style sheet, because the library's scroll lock writes a style element, which the content security
 * policy refuses.
 */
export function Dialog({
  open,
  onOpenChange,
  title,
  description,
  footer,
  size = "regular",
  children,
}: DialogProps) {
  return (
    <RadixDialog.Root open={open} onOpenChange={onOpenChange}>
      <RadixDialog.Portal>
        <div data-dialog-backdrop="" className="fixed inset-0 z-40 bg-[#1b2430]/40" />
        <RadixDialog.Content
          aria-describedby={description ? undefined : ""}
          className={classNames(
            "fixed top-1/2 left-1/2 z-50 flex max-h-[calc(100dvh-2rem)] -translate-x-1/2 -translate-y-1/2 flex-col",
            "w-[calc(100vw-2rem)] rounded-md border border-rule bg-paper shadow-float",
            size === "wide" ? "max-w-3xl" : "max-w-lg",
          )}
        >
          <header className="flex items-start justify-between gap-4 px-6 pt-5 pb-3">
            <div>
              <RadixDialog.Title className="font-semibold text-lg">{title}</RadixDialog.Title>
              {description && (
                <RadixDialog.Description className="mt-1 text-quiet">{description}</RadixDialog.Description>
              )}
            </div>
            <RadixDialog.Close
              aria-label="Close"
              className="-mr-2 rounded-md p-2 text-quiet hover:bg-panel hover:text-ink"
            >
              <Icon name="cross" />
            </RadixDialog.Close>
          </header>
          {children && <div className="overflow-y-auto px-6 py-2">{children}</div>}
          {footer && <footer className="flex flex-wrap justify-end gap-2 px-6 pt-3 pb-5">{footer}</footer>}
        </RadixDialog.Content>
      </RadixDialog.Portal>
    </RadixDialog.Root>
  );
}

type ConfirmDialogProps = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  /** The question, such as "Delete this brief?" */
  title: ReactNode;
  /** What it takes along and whether it can be undone. */
  description: ReactNode;
  /** The deed itself, such as "Delete the brief". */
  confirmLabel: string;
  onConfirm: () => void;
  busy?: boolean;
  children?: ReactNode;
};

/** Asks before something that can't be undone; "Keep it" comes first and has the focus. */
export function ConfirmDialog({
  open,
  onOpenChange,
  title,
  description,
  confirmLabel,
  onConfirm,
  busy = false,
  children,
}: ConfirmDialogProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={title}
      description={description}
      footer={
        <>
          <Button variant="quiet" autoFocus onClick={() => onOpenChange(false)}>
            Keep it
          </Button>
          <Button variant="plain" busy={busy} onClick={onConfirm}>
            {confirmLabel}
          </Button>
        </>
      }
    >
      {children}
    </Dialog>
  );
}
