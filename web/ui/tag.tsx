import type { ReactNode } from "react";
import { classNames } from "./class-names";

const TONES = {
  plain: "border-edge text-quiet",
  waiting: "border-caution text-caution-ink",
  good: "border-saturation text-saturation-ink",
} as const;

type TagProps = { tone?: keyof typeof TONES; children: ReactNode };

/** A state in a thin outline: "asked for review · revision 4". The words say it; the colour only agrees. */
export function Tag({ tone = "plain", children }: TagProps) {
  return (
    <span
      className={classNames(
        "inline-flex items-center whitespace-nowrap rounded-full border px-2.5 py-px text-sm",
        TONES[tone],
      )}
    >
      {children}
    </span>
  );
}
