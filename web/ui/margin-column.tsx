import { type ReactNode, useEffect, useRef, useState } from "react";

/** Below this width there is no margin and notes fold under their lines. */
export const WIDE_ENOUGH_FOR_MARGIN = "(width >= 64rem)";

type MarginNoteEntry = { id: string; content: ReactNode };

type MarginColumnProps = {
  /** In the order of the lines they are about; null where the page has no margin. */
  notes: readonly MarginNoteEntry[] | null;
  /** Whether the screen is wide enough for a margin. */
  shown: boolean;
  /** Holds the lines, each marked with `data-margin-anchor`. */
  children: ReactNode;
};

type Placement = { top: number; anchor: number };

const GAP = 12;
/** From a note's top to the middle of its first line, where the tie meets it. */
const FIRST_LINE = 17;

/**
 * A column at the right for notes, each level with the line it is about and tied to it by a thin rule; a note that
 * would lie on the one before is pushed down and its tie bends.
 */
export function MarginColumn({ notes, shown, children }: MarginColumnProps) {
  const container = useRef<HTMLDivElement>(null);
  const written = notes?.filter((note) => note.content !== null && note.content !== undefined) ?? [];
  const ids = written.map((note) => note.id).join("\n");
  const [layout, setLayout] = useState<{ places: Record<string, Placement>; height: number }>({
    places: {},
    height: 0,
  });
  const visible = shown && written.length > 0;

  useEffect(() => {
    const box = container.current;
    if (!visible || !box) return;
    const measure = () => setLayout(placeNotes(box, ids.split("\n")));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(box);
    for (const note of box.querySelectorAll("[data-margin-note]")) observer.observe(note);
    return () => observer.disconnect();
  }, [visible, ids]);

  if (!shown || notes === null) return children;
  return (
    <div
      ref={container}
      className="relative grid grid-cols-[minmax(0,1fr)_18rem] gap-x-9"
      style={{ minHeight: layout.height }}
    >
      {children}
      <div className="relative">
        {written.map(({ id, content }) => {
          const place = layout.places[id] ?? { top: 0, anchor: FIRST_LINE };
          return (
            <div
              key={id}
              data-margin-note={id}
              className="absolute inset-x-0"
              style={{ top: place.top, visibility: id in layout.places ? undefined : "hidden" }}
            >
              <svg
                aria-hidden="true"
                width="36"
                height="1"
                className="absolute -left-9 overflow-visible"
                style={{ top: FIRST_LINE }}
              >
                <path
                  d={`M0 ${place.anchor - place.top - FIRST_LINE}H18V0H36`}
                  fill="none"
                  strokeDasharray="3 3"
                  className="stroke-edge/60"
                />
              </svg>
              {content}
            </div>
          );
        })}
      </div>
    </div>
  );
}

/** Measures lines and notes, and stacks the notes downward. */
function placeNotes(box: HTMLElement, ids: readonly string[]) {
  const origin = box.getBoundingClientRect().top;
  const places: Record<string, Placement> = {};
  let free = 0;
  for (const id of ids) {
    const line = box.querySelector(`[data-margin-anchor="${CSS.escape(id)}"]`)?.getBoundingClientRect();
    const note = box.querySelector(`[data-margin-note="${CSS.escape(id)}"]`);
    if (!line || !note) continue;
    const anchor = line.top - origin + line.height / 2;
    const top = Math.max(free, anchor - FIRST_LINE);
    places[id] = { top, anchor };
    free = top + note.getBoundingClientRect().height + GAP;
  }
  return { places, height: Math.max(0, free - GAP) };
}
