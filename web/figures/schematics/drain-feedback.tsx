import type { DrawnStage } from "./drawn-stage";
import { DeviceAndInput, SourceToGround, SupplyRail, X, Y } from "./parts";
import { Coupled, Ground, Junction, LEAD, LyingResistor, Resistor, Wire } from "./symbols";

/** Drain feedback: RG from the drain to the gate, R2 (dashed, as there may be none) from the gate to ground. */
export function DrainFeedback({ channel, sourceResistor }: DrawnStage) {
  const drain = 66;
  return (
    <>
      <SupplyRail channel={channel} />
      <Resistor label="RD" x={X.device} from={Y.rail} to={drain} />
      <Wire d={`M${X.device} ${drain}V${Y.gate - LEAD}M${X.gate} ${drain}V${Y.gate}`} />
      <LyingResistor label="RG" y={drain} from={X.gate} to={X.device} />
      <Resistor label="R2" x={X.gate} from={Y.gate} to={Y.ground} optional />
      <Ground x={X.gate} y={Y.ground} />
      <Coupled label="out" node={X.device} y={drain} end={X.output} />
      <Junction x={X.device} y={drain} />
      <SourceToGround sourceResistor={sourceResistor} />
      <DeviceAndInput channel={channel} />
    </>
  );
}
