import { type KeyboardEvent, useRef, useState } from "react";

type RowMovementOptions = {
  /** Ids of the rows on show, in order. */
  ids: readonly string[];
  onOpen?: (id: string) => void;
  onExpand?: (id: string, expanded: boolean) => void;
  isExpanded?: (id: string) => boolean;
  onActiveChange?: (id: string) => void;
  /** Asked when the movement goes past the last row on show. */
  onPastEnd?: () => void;
};

const PAGE_ROWS = 10;

/**
 * Moves one active row through a table by keyboard: arrows or j and k, Home, End, Page Up and Page Down; Enter opens,
 * Space, Arrow Right and Arrow Left expand and fold. Only the active row is in the tab order (roving tabindex), and
 * keys pressed inside a row's own controls are left alone.
 */
export function useRowMovement(options: RowMovementOptions) {
  const { ids, onOpen, onExpand, isExpanded, onActiveChange, onPastEnd } = options;
  const [activeId, setActiveId] = useState<string | null>(null);
  const elements = useRef(new Map<string, HTMLElement>());
  const activeIndex = activeId === null ? -1 : ids.indexOf(activeId);
  const tabStop = activeIndex === -1 ? ids[0] : ids[activeIndex];

  const activate = (id: string) => {
    if (id !== activeId) {
      setActiveId(id);
      onActiveChange?.(id);
    }
  };

  const moveTo = (index: number) => {
    if (index >= ids.length) onPastEnd?.();
    const id = ids[Math.max(0, Math.min(ids.length - 1, index))];
    if (id === undefined) return;
    activate(id);
    elements.current.get(id)?.focus();
  };

  const onKeyDown = (event: KeyboardEvent<HTMLElement>, id: string) => {
    if (event.target !== event.currentTarget || event.ctrlKey || event.metaKey || event.altKey) return;
    const index = ids.indexOf(id);
    const target = targetIndex(event.key, index, ids.length);
    const expandTo = onExpand ? expansionFor(event.key, isExpanded?.(id) ?? false) : null;
    if (target !== null) moveTo(target);
    else if (expandTo !== null) onExpand?.(id, expandTo);
    else if (event.key === "Enter" && onOpen) onOpen(id);
    else return;
    event.preventDefault();
  };

  const rowProps = (id: string) => ({
    ref: (element: HTMLElement | null) => {
      if (element) elements.current.set(id, element);
      else elements.current.delete(id);
    },
    tabIndex: id === tabStop ? 0 : -1,
    onFocus: () => activate(id),
    onKeyDown: (event: KeyboardEvent<HTMLElement>) => onKeyDown(event, id),
  });

  return { activeId: activeIndex === -1 ? null : activeId, activate, rowProps };
}

/** Where a key moves to from a row; null for a key that doesn't move. May lie past either end. */
function targetIndex(key: string, index: number, count: number): number | null {
  switch (key) {
    case "ArrowDown":
    case "j":
      return index + 1;
    case "ArrowUp":
    case "k":
      return index - 1;
    case "PageDown":
      return index + PAGE_ROWS;
    case "PageUp":
      return index - PAGE_ROWS;
    case "Home":
      return 0;
    case "End":
      return count - 1;
    default:
      return null;
  }
}

/** Whether a key expands or folds a row; null for a key that does neither. */
function expansionFor(key: string, expanded: boolean): boolean | null {
  if (key === "ArrowRight") return true;
  if (key === "ArrowLeft") return false;
  return key === " " ? !expanded : null;
}
