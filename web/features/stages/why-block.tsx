import { useMemo } from "react";
import { Link } from "react-router-dom";
import { betterValues } from "#shared/bias/why/better-values";
import { bindingLimit, type Margin, marginsOf } from "#shared/bias/why/margins";
import { type Component, sensitivitiesOf } from "#shared/bias/why/sensitivities";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity, formatResistance } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { CONDITION_UNITS, CONDITION_WORDS } from "./missed-conditions";

type WhyBlockProps = {
  part: Part;
  brief: Brief;
  resistors: Resistors;
  onChange: (resistors: Resistors) => void;
};

/** Why a stage is as it is: the limit that binds, what each component does, and which value would do better. */
export function WhyBlock({ part, brief, resistors, onChange }: WhyBlockProps) {
  const margins = useMemo(() => marginsOf(part, brief, resistors), [part, brief, resistors]);
  const sensitivities = useMemo(() => sensitivitiesOf(part, brief, resistors), [part, brief, resistors]);
  const better = useMemo(() => betterValues(part, brief, resistors), [part, brief, resistors]);
  const { resistances } = usePreferences();
  const binding = bindingLimit(margins);
  const unit = CONDITION_UNITS[binding.condition];
  return (
    <section aria-labelledby="why-title" className="break-inside-avoid">
      <h2 id="why-title" className="pb-1 font-semibold text-sm">
        Why
      </h2>
      <p className="pb-2 text-sm leading-5.5">
        {binding.margin < 0 ? "It misses the " : "The limit that binds is the "}
        {CONDITION_WORDS[binding.condition]}:{" "}
        <span className="value">{formatQuantity(binding.actual, unit)}</span>,{" "}
        {binding.bound === "least" ? "at least " : "at most "}
        <span className="value">{formatQuantity(binding.stated, unit)}</span>.
      </p>
      <div className="grid items-start gap-x-10 gap-y-4 xl:grid-cols-2 print:grid-cols-2">
        <Margins margins={margins} />
        {sensitivities.length > 0 && (
          <table className="w-full text-sm">
            <caption className="pb-1 text-left text-quiet text-xs">
              <Link
                to="/method#sensitivity"
                className="hover:text-ink hover:underline hover:underline-offset-3"
              >
                For one per cent more of each
              </Link>
            </caption>
            <thead>
              <tr className="border-rule border-b text-quiet text-xs">
                <th className="py-0.5 text-left font-normal">component</th>
                <th className="py-0.5 text-right font-normal">swing</th>
                <th className="py-0.5 text-right font-normal">off centre</th>
              </tr>
            </thead>
            <tbody>
              {sensitivities.map(({ component, swing, centring }) => (
                <tr key={component} className="border-rule border-b">
                  <th scope="row" className="py-0.5 text-left font-normal">
                    {COMPONENT_NAMES[component]}
                  </th>
                  <td className="value py-0.5 text-right">
                    {signed(swing, (size) => formatQuantity(size, "V"))}
                  </td>
                  <td className="value py-0.5 text-right">
                    {signed(centring, (size) => formatPercent(size, 2))}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
      </div>
      {better.length > 0 && (
        <div data-no-print="" className="mt-3 text-sm">
          <h3 className="pb-1 text-quiet text-xs">
            <Link
              to="/method#better-value"
              className="hover:text-ink hover:underline hover:underline-offset-3"
            >
              Better with one value changed
            </Link>
          </h3>
          <ul className="flex flex-col gap-1">
            {better.map(({ resistor, value, series, improves, centringError, assured }) => (
              <li key={resistor}>
                <button
                  type="button"
                  onClick={() => onChange({ ...resistors, [resistor]: value })}
                  className="py-0.5 text-left underline decoration-rule underline-offset-3 hover:decoration-ink"
                >
                  {resistor.toUpperCase()}{" "}
                  <span className="value">{formatResistance(value, resistances)}</span> from {series}:{" "}
                  {improves === "centring"
                    ? `${formatPercent(centringError, 1)} off centre`
                    : `${formatQuantity(assured, "V")} assured`}
                </button>
              </li>
            ))}
          </ul>
        </div>
      )}
    </section>
  );
}

const COMPONENT_NAMES: Record<Component, string> = {
  r1: "R1",
  r2: "R2",
  rg: "RG",
  rd: "RD",
  rs: "RS",
  rs2: "RS2",
  rail: "rail",
  negativeRail: "negative rail",
  rl: "load",
  vt: "threshold",
  k: "conduction parameter",
};

function Margins({ margins }: { margins: readonly Margin[] }) {
  return (
    <table className="w-full text-sm">
      <caption className="pb-1 text-left text-quiet text-xs">
        <Link to="/method#margin" className="hover:text-ink hover:underline hover:underline-offset-3">
          What each condition has to spare
        </Link>
      </caption>
      <thead>
        <tr className="border-rule border-b text-quiet text-xs">
          <th className="py-0.5 text-left font-normal">condition</th>
          <th className="py-0.5 text-right font-normal">limit</th>
          <th className="py-0.5 text-right font-normal">has</th>
          <th className="py-0.5 text-right font-normal">to spare</th>
        </tr>
      </thead>
      <tbody>
        {margins.map(({ condition, bound, stated, actual, margin }) => (
          <tr key={`${condition} ${bound}`} className="border-rule border-b">
            <th scope="row" className="py-0.5 pr-2 text-left font-normal">
              {CONDITION_WORDS[condition]}
            </th>
            <td className="value whitespace-nowrap py-0.5 text-right">
              {bound === "least" ? "≥" : "≤"} {formatQuantity(stated, CONDITION_UNITS[condition])}
            </td>
            <td className="value whitespace-nowrap py-0.5 pl-2 text-right">
              {formatQuantity(actual, CONDITION_UNITS[condition])}
            </td>
            <td
              className={`value whitespace-nowrap py-0.5 pl-2 text-right ${margin < 0 ? "text-caution" : ""}`}
            >
              {margin < 0 ? "missed by " : ""}
              {formatPercent(Math.abs(margin), 0)}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function signed(value: number, format: (size: number) => string): string {
  return `${value < 0 ? "−" : "+"}${format(Math.abs(value))}`;
}
