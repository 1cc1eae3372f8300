import type { DrawnStage } from "./drawn-stage";
import { DeviceAndInput, RailAndDivider, X, Y } from "./parts";
import { Coupled, Ground, Junction, LEAD, Resistor, Wire } from "./symbols";

/** Source follower: the drain at the rail, RS and the output at the source. */
export function Follower({ channel }: DrawnStage) {
  const source = Y.gate + LEAD;
  return (
    <>
      <RailAndDivider channel={channel} />
      <Wire d={`M${X.device} ${Y.rail}V${Y.gate - LEAD}`} />
      <Resistor label="RS" x={X.device} from={source} to={Y.ground} />
      <Ground x={X.device} y={Y.ground} />
      <Coupled label="out" node={X.device} y={source + 6} end={X.output} />
      <Junction x={X.device} y={source + 6} />
      <DeviceAndInput channel={channel} />
    </>
  );
}
