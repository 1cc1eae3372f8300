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
 * A window over the page that holds the focus until it is closed. The backdrop is our own element, which takes the
 * wheel so that the page stands still, because the library's scroll lock writes a style element and the content
 * security policy refuses that.
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
        <div className="pointer-events-auto fixed inset-0 z-40 overflow-y-scroll overscroll-contain bg-backdrop [scrollbar-width:none]">
          <div className="h-[calc(100%+1px)]" />
        </div>
        <RadixDialog.Content
          aria-describedby={description ? undefined : ""}
          className={classNames(
            "fixed top-1/2 left-1/2 z-50 flex max-h-[calc(100dvh-2rem)] -translate-x-1/2 -translate-y-1/2 flex-col",
            "w-[calc(100vw-2rem)] rounded-md border border-rule bg-paper shadow-float",
            size === "wide" ? "max-w-3xl" : "max-w-lg",
          )}
        >
          <header className="pt-5 pr-14 pb-3 pl-6">
            <RadixDialog.Title className="font-semibold text-lg">{title}</RadixDialog.Title>
            {description && (
              <RadixDialog.Description className="mt-1 text-quiet">{description}</RadixDialog.Description>
            )}
          </header>
          {children && <div className="overflow-y-auto px-6 py-2">{children}</div>}
          {footer && <footer className="flex flex-wrap justify-end gap-2 px-6 pt-3 pb-5">{footer}</footer>}
          {/* Last, so that the focus starts in the content. */}
          <RadixDialog.Close
            aria-label="Close"
            className="absolute top-4 right-4 inline-flex rounded-md p-2 text-quiet hover:bg-panel hover:text-ink"
          >
            <Icon name="cross" />
          </RadixDialog.Close>
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
