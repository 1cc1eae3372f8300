import type { DrawnStage } from "./drawn-stage";
import { Bypass, Coupled, GATE_LEAD, Ground, Junction, LEAD, Mosfet, Rail, Resistor, Wire } from "./symbols";

/** Where things stand in every schematic. */
export const X = { input: 14, gate: 68, device: 122, bypass: 158, output: 190 } as const;
export const Y = { rail: 22, gate: 100, ground: 184 } as const;

/** The positive rail; a P-channel stage is its mirror, so the rail that its resistors hang on is negative. */
export function SupplyRail({
  channel,
  from = X.device - 26,
}: Pick<DrawnStage, "channel"> & { from?: number }) {
  return <Rail label={channel === "n" ? "VDD" : "−VDD"} from={from} to={X.device + 10} y={Y.rail} />;
}

/** The device with the input coupled to its gate. */
export function DeviceAndInput({ channel }: Pick<DrawnStage, "channel">) {
  return (
    <>
      <Coupled label="in" node={X.gate} y={Y.gate} end={X.input} />
      <Junction x={X.gate} y={Y.gate} />
      <Wire d={`M${X.gate} ${Y.gate}H${X.device - GATE_LEAD}`} />
      <Mosfet x={X.device} y={Y.gate} channel={channel} />
    </>
  );
}

/** The rail, and R1 and R2 between it and ground, the gate between them. */
export function RailAndDivider({ channel }: Pick<DrawnStage, "channel">) {
  return (
    <>
      <SupplyRail channel={channel} from={X.gate - 10} />
      <Resistor label="R1" x={X.gate} from={Y.rail} to={Y.gate} />
      <Resistor label="R2" x={X.gate} from={Y.gate} to={Y.ground} />
      <Ground x={X.gate} y={Y.ground} />
    </>
  );
}

/** RD at the drain, the output taken from between them. */
export function DrainResistorAndOutput() {
  const drain = Y.gate - LEAD;
  return (
    <>
      <Resistor label="RD" x={X.device} from={Y.rail} to={drain} />
      <Coupled label="out" node={X.device} y={drain - 4} end={X.output} />
      <Junction x={X.device} y={drain - 4} />
    </>
  );
}

/** RS from the source to ground, bypassed or not; a wire where there is none. */
export function SourceToGround({ sourceResistor }: Pick<DrawnStage, "sourceResistor">) {
  const source = Y.gate + LEAD;
  return (
    <>
      {sourceResistor === "none" ? (
        <Wire d={`M${X.device} ${source}V${Y.ground}`} />
      ) : (
        <Resistor label="RS" x={X.device} from={source} to={Y.ground} />
      )}
      {sourceResistor === "bypassed" && (
        <Bypass node={X.device} x={X.bypass} from={source + 6} to={Y.ground} />
      )}
      <Ground x={X.device} y={Y.ground} />
    </>
  );
}
