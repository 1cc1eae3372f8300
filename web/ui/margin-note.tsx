import type { ReactNode } from "react";
import { classNames } from "./class-names";
import { Icon } from "./icon";

type MarginNoteProps = {
  /** `caution` adds the colour, the mark and the word. */
  tone?: "note" | "caution";
  /** The first words, in bold: who says it or what it is about. */
  lead?: ReactNode;
  /** Draws the thin rule that ties the note to the line at its left, on wide screens. */
  tied?: boolean;
  className?: string;
  children: ReactNode;
};

/**
 * A note in the margin beside the line it is about, as in a reviewed notebook.
 */
export function MarginNote({ tone = "note", lead, tied = false, className, children }: MarginNoteProps) {
  const caution = tone === "caution";
  return (
    <aside
      role="note"
      className={classNames(
        "relative border-l py-1.5 pl-3.5 text-sm leading-5.5",
        caution ? "border-caution" : "border-rule",
        tied &&
          "lg:before:absolute lg:before:top-4 lg:before:-left-9 lg:before:w-9 lg:before:border-edge/60 " +
            "lg:before:border-t lg:before:border-dashed lg:before:content-['']",
        className,
      )}
    >
      {caution && (
        <span className="mr-1.5 inline-flex items-baseline gap-1 font-semibold text-caution-ink">
          <Icon name="caution" className="relative top-0.5" />
          Caution.
        </span>
      )}
      {lead && <strong>{lead}</strong>} {children}
    </aside>
  );
}

/** A block of words that can't be overlooked: a caution on a sheet, tied by a heavier rule. */
export function CautionBlock({ children }: { children: ReactNode }) {
  return (
    <div
      role="note"
      data-keep-together=""
      className="border-caution border-l-3 bg-panel px-3.5 py-1.5 text-sm leading-5.5"
    >
      <span className="mr-1.5 inline-flex items-baseline gap-1 font-semibold text-caution-ink">
        <Icon name="caution" className="relative top-0.5" />
        Caution.
      </span>
      {children}
    </div>
  );
}
