import { createContext, type ReactNode, useContext } from "react";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import { formatRkm } from "#shared/values/rkm";
import { classNames } from "./class-names";

/** How resistances and capacitances are written: 4.7 kΩ, or 4k7 as marked on the part (IEC 60062). */
export type ValueStyle = "engineering" | "marking";

const ValueStyleContext = createContext<ValueStyle>("engineering");

type ValueStyleProviderProps = { style: ValueStyle; children: ReactNode };

/** Sets how every `Value` below it writes resistances. */
export function ValueStyleProvider({ style, children }: ValueStyleProviderProps) {
  return <ValueStyleContext value={style}>{children}</ValueStyleContext>;
}

type ValueProps = {
  /** SI; null or undefined shows a dash. With the unit "%" a fraction. */
  number: number | null | undefined;
  unit: string;
  /** Significant digits; three unless more are asked for. */
  digits?: number;
  /** Every digit the number has, as for a value somebody chose. */
  exact?: boolean;
  className?: string;
};

/** A number with its unit, in engineering notation and mono. */
export function Value({ className, ...rest }: ValueProps) {
  return <span className={classNames("value", className)}>{useValueText(rest)}</span>;
}

/** The text that `Value` shows, for attributes and sentences. */
export function useValueText({ number, unit, digits, exact }: Omit<ValueProps, "className">): string {
  const style = useContext(ValueStyleContext);
  if (number === null || number === undefined) return "–";
  if (unit === "%") return formatPercent(number, digits ?? 3);
  if (unit === "Ω" && style === "marking") return formatRkm(number);
  return formatQuantity(number, unit, { digits, exact });
}
