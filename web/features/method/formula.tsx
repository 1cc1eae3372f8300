import { createElement, Fragment, type ReactNode } from "react";
import { type FormulaPart, formulaInWords, parseFormula } from "./parse-formula";

type FormulaProps = {
  /** In the notation of `parseFormula`. */
  source: string;
  className?: string;
};

/** A formula set in type: symbols slanted, subscripts upright, fractions stacked; read out in words. */
export function Formula({ source, className }: FormulaProps) {
  const parts = parseFormula(source);
  return (
    <span role="math" aria-label={formulaInWords(parts)} className={className}>
      {inARow(parts.map(renderPart))}
    </span>
  );
}

/** Children that never change places, so they need no keys. */
function inARow(nodes: readonly ReactNode[]): ReactNode {
  return createElement(Fragment, null, ...nodes);
}

function renderPart(part: FormulaPart): ReactNode {
  switch (part.kind) {
    case "symbol":
      return <i>{part.text}</i>;
    case "text":
      return part.text;
    case "sub":
      return <sub>{part.text}</sub>;
    case "sup":
      return <sup>{part.text}</sup>;
    case "root":
      return (
        <span>
          √<span className="border-current border-t pt-px">{inARow(part.of.map(renderPart))}</span>
        </span>
      );
    case "fraction":
      return (
        <span className="mx-0.5 inline-flex flex-col items-center align-middle leading-snug">
          <span className="border-current border-b px-1">{inARow(part.over.map(renderPart))}</span>
          <span className="px-1">{inARow(part.under.map(renderPart))}</span>
        </span>
      );
  }
}

/** Words with formulas among them, each between backquotes. */
export function WithFormulas({ children }: { children: string }) {
  const pieces = children.split("`");
  // Odd pieces stand between backquotes.
  return inARow(
    pieces.map((piece, index) => (index % 2 === 1 ? createElement(Formula, { source: piece }) : piece)),
  );
}
