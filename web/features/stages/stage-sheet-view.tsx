import { type ReactNode, useMemo, useState } from "react";
import { loadLineFigure } from "#shared/bias/figure";
import { describeStage, distortionPeak, negativeRail, type StageSheet } from "#shared/bias/stage-sheet";
import { marginsOf } from "#shared/bias/why/margins";
import { cautionsFor } from "#shared/cautions";
import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { formatQuantity } from "#shared/values/engineering";
import { BalanceBar } from "../../figures/balance-bar";
import { LoadLineFigure } from "../../figures/load-line-figure";
import { LoadLineTable } from "../../figures/load-line-table";
import { CautionBlock, MarginNote } from "../../ui/margin-note";
import { Slider } from "../../ui/slider";
import { missedConditions } from "./missed-conditions";
import { ResistorSteppers } from "./resistor-steppers";
import { StageFigures } from "./stage-figures";
import { StageVerdict } from "./stage-verdict";
import { StageYield } from "./stage-yield";
import { WhyBlock } from "./why-block";

type StageSheetViewProps = {
  /** The kept stage; null for a fit that isn't kept. */
  stageId: number | null;
  part: Part;
  brief: Brief;
  resistors: Resistors;
  onChange: (resistors: Resistors) => void;
  /** What stands under the resistors: that values were changed, and what to do about it. */
  underResistors?: ReactNode;
  /** What stands under the figure: the note. */
  underFigure?: ReactNode;
};

const exact = { exact: true } as const;
/** The drive goes past the symmetric swing, so that clipping can be seen. */
const MOST_DRIVE = 1.3;
const ROOM_TEMPERATURE = 25;

/** A stage on its load line, with every figure; each follows the values at once, worked out here. */
export function StageSheetView(props: StageSheetViewProps) {
  const { stageId, part, brief, resistors, onChange, underResistors, underFigure } = props;
  const [celsius, setCelsius] = useState(() => clamp(ROOM_TEMPERATURE, brief.ambient.min, brief.ambient.max));
  const sheet = useMemo(
    () => describeStage(part, brief, resistors, celsius),
    [part, brief, resistors, celsius],
  );
  const cautions = useMemo(() => cautionsFor(part, brief, resistors), [part, brief, resistors]);
  const margins = useMemo(() => marginsOf(part, brief, resistors), [part, brief, resistors]);
  const missed = missedConditions(part, brief, resistors, margins);
  return (
    // On paper the two columns stay, shrunk so that a sheet is one page.
    <div className="mt-6 grid grid-cols-[minmax(0,1fr)] gap-x-14 gap-y-9 lg:grid-cols-[minmax(0,1fr)_25rem] lg:grid-rows-[auto_1fr] print:grid-cols-[minmax(0,1fr)_22rem] print:grid-rows-[auto_1fr] print:gap-x-8 print:gap-y-5 print:[zoom:0.77]">
      <div className="min-w-0">
        <DrivenFigure part={part} brief={brief} resistors={resistors} sheet={sheet} celsius={celsius} />
      </div>
      <div className="flex min-w-0 flex-col gap-7 lg:row-span-2 print:row-span-2 print:gap-4 print:[&_dl>div]:py-1">
        <div>
          {sheet.bias.swing && (
            <BalanceBar
              size="sheet"
              towardOhmic={sheet.bias.swing.towardOhmic}
              towardCutoff={sheet.bias.swing.towardCutoff}
              assured={sheet.assured.swing}
              scale={Math.max(sheet.bias.swing.towardOhmic, sheet.bias.swing.towardCutoff)}
            />
          )}
          <p aria-live="polite" className="mt-1 leading-6.5">
            <StageVerdict sheet={sheet} brief={brief} part={part} />
          </p>
          <StageYield stageId={stageId} partId={part.id} brief={brief} resistors={resistors} />
        </div>
        {missed.length > 0 && (
          <div className="flex flex-col gap-3">
            {missed.map((words) => (
              <MarginNote key={words} lead="Misses the brief.">
                {words}
              </MarginNote>
            ))}
          </div>
        )}
        <div>
          <ResistorSteppers brief={brief} resistors={resistors} onChange={onChange} />
          {underResistors}
        </div>
        <section aria-labelledby="figures-title">
          <div className="flex items-baseline justify-between gap-4 pb-1 text-sm">
            <h2 id="figures-title" className="font-semibold">
              At {formatQuantity(celsius, "°C", exact)}
            </h2>
            <span data-no-print="" className="text-quiet text-xs">
              each name leads to its formula
            </span>
          </div>
          {brief.ambient.max > brief.ambient.min && (
            <div data-no-print="" className="pb-2">
              <Slider
                label="Ambient"
                value={celsius}
                onChange={setCelsius}
                min={brief.ambient.min}
                max={brief.ambient.max}
                mark={ROOM_TEMPERATURE}
                format={(value) => formatQuantity(value, "°C", exact)}
              />
            </div>
          )}
          <StageFigures sheet={sheet} brief={brief} />
        </section>
      </div>
      <div className="flex min-w-0 flex-col gap-7 print:gap-4">
        <section aria-label="Cautions" className="grid items-start gap-3 xl:grid-cols-2 print:grid-cols-2">
          {cautions.map(({ code, message }) => (
            <CautionBlock key={code}>{message}</CautionBlock>
          ))}
        </section>
        <WhyBlock
          part={part}
          brief={brief}
          resistors={resistors}
          sheet={sheet}
          margins={margins}
          onChange={onChange}
        />
        {underFigure}
      </div>
    </div>
  );
}

type DrivenFigureProps = {
  part: Part;
  brief: Brief;
  resistors: Resistors;
  sheet: StageSheet;
  celsius: number;
};

/** The load-line figure with the drive of its wave, and the same as a table. */
function DrivenFigure({ part, brief, resistors, sheet, celsius }: DrivenFigureProps) {
  const symmetric = sheet.bias.swing?.symmetric ?? 0;
  const [drive, setDrive] = useState<number | null>(null);
  const [asTable, setAsTable] = useState(false);
  const most = MOST_DRIVE * symmetric;
  const outputPeak = clamp(drive ?? (distortionPeak(brief) || symmetric), 0, most);
  const data = useMemo(
    () => loadLineFigure(part, brief, resistors, celsius, outputPeak),
    [part, brief, resistors, celsius, outputPeak],
  );
  return (
    <>
      <LoadLineFigure
        data={data}
        driveControl={
          most > 0 && (
            <div className="max-w-80">
              <Slider
                label="Drive, peak at the output"
                value={outputPeak}
                onChange={setDrive}
                min={0}
                max={most}
                step={most / 100}
                format={(value) => formatQuantity(value, "V")}
              />
            </div>
          )
        }
        caption={
          <>
            Hatched: where the Q-point may land for any part inside the datasheet range on{" "}
            {railInWords(brief)}, over resistor tolerance and temperature.{" "}
            <button
              type="button"
              data-no-print=""
              aria-expanded={asTable}
              onClick={() => setAsTable(!asTable)}
              className="underline underline-offset-3 hover:text-ink"
            >
              {asTable ? "Hide the table" : "As a table"}
            </button>
          </>
        }
      />
      {asTable && (
        <div className="mt-4">
          <LoadLineTable data={data} />
        </div>
      )}
    </>
  );
}

function railInWords(brief: Brief): string {
  const tolerance = `± ${formatQuantity(brief.rail.tolerance, "%", exact)}`;
  const positive = formatQuantity(brief.rail.volts, "V", exact);
  const negative = negativeRail(brief);
  if (negative === 0) return `a rail of ${positive} ${tolerance}`;
  return `rails of ${positive} and ${formatQuantity(-negative, "V", exact)}, each ${tolerance}`;
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}
