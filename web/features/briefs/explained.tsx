import type { ReactNode } from "react";

type ExplainedProps = { explanation: string; children: ReactNode };

/** A figure with a few words about it: read out after it, and shown when it is pointed at. */
export function Explained({ explanation, children }: ExplainedProps) {
  return (
    <span title={explanation}>
      {children}
      <span className="sr-only">, {explanation}</span>
    </span>
  );
}
