import type { DrawnStage } from "./drawn-stage";
import { DeviceAndInput, DrainResistorAndOutput, RailAndDivider, SourceToGround } from "./parts";

/** Four-resistor common source: a divider for the gate, RD at the drain, RS at the source. */
export function FourResistor({ channel, sourceResistor }: DrawnStage) {
  return (
    <>
      <RailAndDivider channel={channel} />
      <DrainResistorAndOutput />
      <SourceToGround sourceResistor={sourceResistor} />
      <DeviceAndInput channel={channel} />
    </>
  );
}
