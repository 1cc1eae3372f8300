import { createContext, type ReactNode, useContext } from "react";
import {
  formatPercent,
  formatQuantity,
  formatResistance,
  type ResistanceStyle,
} from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";
import { classNames } from "./class-names";

const ResistanceStyleContext = createContext<ResistanceStyle>("spelled");

type ResistanceStyleProviderProps = { value: ResistanceStyle; children: ReactNode };

/** Sets how every `Value` below it writes resistances: 4.7 kΩ, or 4k7 as marked on the part (IEC 60062). */
export function ResistanceStyleProvider({ value, children }: ResistanceStyleProviderProps) {
  return <ResistanceStyleContext value={value}>{children}</ResistanceStyleContext>;
}

export type ValueProps = {
  /** SI, a fraction for "%"; null and undefined show a dash. */
  number: number | null | undefined;
  unit: Unit;
  /** Significant digits; three unless more are asked for. Resistances keep every digit unless fewer are asked for. */
  digits?: number;
  /** Places behind the point of a percentage. */
  decimals?: number;
  /** A stated figure: every digit it has and no more. */
  exact?: boolean;
  className?: string;
};

/** A number with its unit, in engineering notation and mono. */
export function Value({ className, ...rest }: ValueProps) {
  return <span className={classNames("value", className)}>{useValueText(rest)}</span>;
}

/** The text that `Value` shows, for attributes and sentences. */
export function useValueText({
  number,
  unit,
  digits,
  decimals,
  exact,
}: Omit<ValueProps, "className">): string {
  const style = useContext(ResistanceStyleContext);
  if (unit === "Ω") return formatResistance(number ?? null, style, digits);
  if (unit === "%" && !exact) return formatPercent(number, decimals);
  return formatQuantity(number, unit, { digits, exact });
}
