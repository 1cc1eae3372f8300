import type { DrawnStage } from "./drawn-stage";
import { DeviceAndInput, DrainResistorAndOutput, RailAndDivider, X, Y } from "./parts";
import { Bypass, Ground, LEAD, Resistor } from "./symbols";

/** Common source with a split source resistor: RS in the signal's way, RS2 below it bypassed. */
export function SplitSource({ channel }: DrawnStage) {
  const source = Y.gate + LEAD;
  const middle = (source + Y.ground) / 2;
  return (
    <>
      <RailAndDivider channel={channel} />
      <DrainResistorAndOutput />
      <Resistor label="RS" x={X.device} from={source} to={middle} />
      <Resistor label="RS2" x={X.device} from={middle} to={Y.ground} />
      <Bypass node={X.device} x={X.bypass} from={middle} to={Y.ground} />
      <Ground x={X.device} y={Y.ground} />
      <DeviceAndInput channel={channel} />
    </>
  );
}
