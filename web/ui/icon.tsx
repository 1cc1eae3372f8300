import type { ComponentProps } from "react";

const PATHS = {
  "chevron-down": "M4 6l4 4 4-4",
  "chevron-left": "M10 4l-4 4 4 4",
  "chevron-right": "M6 4l4 4-4 4",
  "arrow-up": "M8 13V3M4 7l4-4 4 4",
  "arrow-down": "M8 3v10M4 9l4 4 4-4",
  check: "M3 8.5l3.5 3.5L13 4.5",
  cross: "M4 4l8 8M12 4l-8 8",
  plus: "M8 3v10M3 8h10",
  columns: "M2.5 3.5h11v9h-11zM6.2 3.5v9M9.8 3.5v9",
  more: "M3.5 8h.01M8 8h.01M12.5 8h.01",
  caution: "M8 2.2L14.5 13.5h-13zM8 6.5v3.2M8 11.6h.01",
  note: "M8 7.2v4M8 4.8h.01M8 14a6 6 0 100-12 6 6 0 000 12z",
} as const;

export type IconName = keyof typeof PATHS;

type IconProps = Omit<ComponentProps<"svg">, "name"> & { name: IconName };

/** A 16 px line icon in the text's colour; decoration only, so the words beside it carry the meaning. */
export function Icon({ name, className, ...rest }: IconProps) {
  return (
    <svg
      viewBox="0 0 16 16"
      width="1em"
      height="1em"
      fill="none"
      stroke="currentColor"
      strokeWidth={name === "more" ? 2 : 1.5}
      strokeLinecap="round"
      strokeLinejoin="round"
      aria-hidden="true"
      className={`inline-block shrink-0 ${className ?? ""}`}
      {...rest}
    >
      <path d={PATHS[name]} />
    </svg>
  );
}
