import { useMemo } from "react";
import { figureStage, type StageSheet } from "#shared/bias/stage-sheet";
import { betterValues } from "#shared/bias/why/better-values";
import { bindingLimit, type Margin } from "#shared/bias/why/margins";
import { type Sensitivity, sensitivitiesOf } from "#shared/bias/why/sensitivities";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import { BetterValueTable } from "./better-value-table";
import { CompactTable } from "./compact-table";
import { nameOfComponent } from "./component-words";
import {
  actualInWords,
  marginInWords,
  nameOfCondition,
  placeInWords,
  statedInWords,
} from "./condition-words";
import { EveryBoard } from "./every-board";

type WhyBlockProps = {
  part: Part;
  brief: Brief;
  resistors: Resistors;
  sheet: StageSheet;
  margins: readonly Margin[];
  onChange: (resistors: Resistors) => void;
};

/** Why a stage is as it is: the limit that binds, what each component does, and which value would do better. */
export function WhyBlock({ part, brief, resistors, sheet, margins, onChange }: WhyBlockProps) {
  const sensitivities = useMemo(() => sensitivitiesOf(part, brief, resistors), [part, brief, resistors]);
  const better = useMemo(() => betterValues(part, brief, resistors), [part, brief, resistors]);
  const { centringError } = figureStage(part, brief, resistors).bias;
  return (
    <section aria-labelledby="why-title">
      <h2 id="why-title" className="text-lg">
        Why
      </h2>
      <p className="pb-4 print:pb-2">
        <Binding margin={bindingLimit(margins)} brief={brief} />
      </p>
      <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-x-10 gap-y-6 xl:grid-cols-[minmax(0,1fr)_minmax(0,1fr)] print:grid-cols-[minmax(0,1fr)_minmax(0,1fr)] print:gap-x-6 print:gap-y-3">
        <Margins margins={margins} brief={brief} />
        {sensitivities.length > 0 && <Sensitivities sensitivities={sensitivities} />}
        {/* On paper the verdict's words stand for it: a sheet is one page. */}
        <div data-no-print="">
          <EveryBoard sheet={sheet} />
        </div>
        <BetterValueTable
          better={better}
          present={{ centringError, assured: sheet.assured.swing.symmetric }}
          resistors={resistors}
          onChange={onChange}
        />
      </div>
    </section>
  );
}

/** The limit that binds, in one sentence. */
function Binding({ margin, brief }: { margin: Margin; brief: Brief }) {
  const limit = margin.bound === "least" ? "asked for" : "allowed";
  return (
    <>
      {margin.margin < 0 ? "Past its limit: " : "The limit that binds: "}
      <strong>{nameOfCondition(margin.condition, brief)}</strong>, {actualInWords(margin)},{" "}
      {placeInWords(margin.margin)} the {statedInWords(margin)} {limit}.
    </>
  );
}

function Margins({ margins, brief }: { margins: readonly Margin[]; brief: Brief }) {
  return (
    <CompactTable
      title="Margin to each limit"
      anchor="margin"
      columns={{ name: "condition", stated: "limit", actual: "has", margin: "margin" }}
      rows={margins.map((one) => ({
        id: `${one.condition} ${one.bound}`,
        cells: {
          name: (
            <>
              {nameOfCondition(one.condition, brief)}
              {!one.required && <span className="text-quiet"> (not required)</span>}
            </>
          ),
          stated: `${one.bound === "least" ? "≥" : "≤"} ${statedInWords(one)}`,
          actual: actualInWords(one),
          margin:
            one.margin < 0 && one.required ? (
              <strong className="text-caution-ink">{marginInWords(one.margin)}</strong>
            ) : (
              marginInWords(one.margin)
            ),
        },
      }))}
    />
  );
}

function Sensitivities({ sensitivities }: { sensitivities: readonly Sensitivity[] }) {
  return (
    <CompactTable
      title="What +1 % of each does"
      anchor="sensitivity"
      columns={{
        name: "component",
        swing: "swing",
        share: <span className="sr-only">swing, per cent</span>,
        centring: "off centre, points",
      }}
      rows={sensitivities.map(({ component, swing, swingShare, centring }) => ({
        id: component,
        cells: {
          name: nameOfComponent(component),
          swing: formatQuantity(swing, "V", { sign: true, digits: 2 }),
          share: signed(formatPercent(swingShare, 2), swingShare),
          centring: signed((100 * centring).toFixed(2).replace("-", "−"), centring),
        },
      }))}
    />
  );
}

/** Puts a plus before what is above zero, as written. */
function signed(text: string, value: number): string {
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}
