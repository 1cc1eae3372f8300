import { Toast as RadixToast } from "radix-ui";
import { useSyncExternalStore } from "react";
import { Icon } from "./icon";

type ToastOptions = {
  /** Something to do about it, such as undo; the toast closes after. */
  action?: { label: string; onAction: () => void };
  tone?: "plain" | "caution";
};

type ToastEntry = ToastOptions & { id: number; message: string };

/** Long enough to read and to reach the action; hover and focus hold it. */
const SHOWN_MS = 8000;
const MOST_AT_ONCE = 3;

let entries: readonly ToastEntry[] = [];
let lastId = 0;
const listeners = new Set<() => void>();

function replaceEntries(next: readonly ToastEntry[]) {
  entries = next;
  for (const listener of listeners) listener();
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

function dismiss(id: number) {
  replaceEntries(entries.filter((entry) => entry.id !== id));
}

/** Says in passing what has happened, at the foot of the page. */
export function showToast(message: string, options: ToastOptions = {}) {
  lastId += 1;
  replaceEntries([...entries, { ...options, id: lastId, message }].slice(-MOST_AT_ONCE));
}

/** Says what was done and offers to take it back. */
export function showUndoToast(message: string, onUndo: () => void) {
  showToast(message, { action: { label: "Undo", onAction: onUndo } });
}

/** Where toasts appear; once, near the root. F8 moves the focus there. */
export function Toaster() {
  const shown = useSyncExternalStore(subscribe, () => entries);
  return (
    <RadixToast.Provider duration={SHOWN_MS} label="Notice" swipeDirection="right">
      {shown.map(({ id, message, action, tone }) => (
        <RadixToast.Root
          key={id}
          type={tone === "caution" ? "foreground" : "background"}
          onOpenChange={(open) => !open && dismiss(id)}
          className="flex items-center gap-3 rounded-md border border-rule bg-ink py-2 pr-2 pl-4 text-paper shadow-float"
        >
          {tone === "caution" && <Icon name="caution" />}
          <RadixToast.Description className="grow py-0.5 text-sm">{message}</RadixToast.Description>
          {action && (
            <RadixToast.Action
              altText={action.label}
              onClick={action.onAction}
              className="rounded-sm px-2 py-0.5 font-semibold text-sm underline underline-offset-3 outline-offset-0"
            >
              {action.label}
            </RadixToast.Action>
          )}
          <RadixToast.Close aria-label="Dismiss" className="rounded-sm p-1.5 outline-offset-0">
            <Icon name="cross" />
          </RadixToast.Close>
        </RadixToast.Root>
      ))}
      <RadixToast.Viewport
        data-toaster=""
        className="fixed right-4 bottom-4 z-60 flex w-96 max-w-[calc(100vw-2rem)] flex-col gap-2 outline-none"
      />
    </RadixToast.Provider>
  );
}
