import type { DrawnStage } from "./drawn-stage";
import { DeviceAndInput, DrainResistorAndOutput, SupplyRail, X, Y } from "./parts";
import { Bypass, Ground, LEAD, Rail, Resistor } from "./symbols";

/** Common source with its gate at ground: RG to ground, RS to the negative rail. */
export function NegativeRail({ channel, sourceResistor }: DrawnStage) {
  const source = Y.gate + LEAD;
  const ground = Y.gate + 54;
  return (
    <>
      <SupplyRail channel={channel} />
      <Resistor label="RG" x={X.gate} from={Y.gate} to={ground} />
      <Ground x={X.gate} y={ground} />
      <DrainResistorAndOutput />
      <Resistor label="RS" x={X.device} from={source} to={Y.ground - 2} />
      {sourceResistor === "bypassed" && <Bypass node={X.device} x={X.bypass} from={source + 6} to={ground} />}
      <Rail
        label={channel === "n" ? "−VSS" : "VSS"}
        from={X.device - 26}
        to={X.device + 10}
        y={Y.ground - 2}
        below
      />
      <DeviceAndInput channel={channel} />
    </>
  );
}
