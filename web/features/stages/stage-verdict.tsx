import type { StageSheet } from "#shared/bias/stage-sheet";
import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import { bindingBuildInWords, everyBoardInWords } from "./every-board";

type StageVerdictProps = { sheet: StageSheet; brief: Brief; part: Part };

/** What the stage does and what limits it, for the typical device and over the spread, in sentences. */
export function StageVerdict({ sheet, brief, part }: StageVerdictProps) {
  const { region, swing, centringError } = sheet.bias;
  if (region === "cutoff") return <>The device is off: it amplifies nothing.</>;
  if (!swing || centringError === null) {
    return (
      <>The device is in the ohmic region (non-saturation): it amplifies little and can't swing evenly.</>
    );
  }
  const limit =
    centringError < 0.005
      ? "neither side runs out first"
      : swing.towardOhmic < swing.towardCutoff
        ? "room toward the ohmic region runs out first"
        : "room toward cutoff runs out first";
  const { assured } = sheet;
  return (
    <>
      <strong>{formatQuantity(swing.symmetric, "V")} peak</strong> both ways,{" "}
      {formatPercent(centringError, 1)} off centre; {limit}. {everyBoardInWords(assured)}
      {assured.swing.symmetric > 0 && (
        <>
          : <strong>{formatQuantity(assured.swing.symmetric, "V")}</strong>
        </>
      )}
      . What binds: {bindingBuildInWords(assured, brief, part)}.
    </>
  );
}
