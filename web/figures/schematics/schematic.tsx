import { type ReactNode, useId } from "react";
import { circuitOf } from "#shared/bias/circuits/registry";
import type { CircuitName } from "#shared/schemas/circuit";
import { classNames } from "../../ui/class-names";
import { DrainFeedback } from "./drain-feedback";
import type { DrawnStage } from "./drawn-stage";
import { Follower } from "./follower";
import { FourResistor } from "./four-resistor";
import { NegativeRail } from "./negative-rail";
import { SplitSource } from "./split-source";

const DRAWINGS: Record<CircuitName, (stage: DrawnStage) => ReactNode> = {
  "four-resistor": FourResistor,
  "split-source": SplitSource,
  follower: Follower,
  "drain-feedback": DrainFeedback,
  "negative-rail": NegativeRail,
};

type SchematicProps = DrawnStage & { circuit: CircuitName; className?: string };

/** A circuit's schematic, its resistors named as everywhere else, the Q-point's dot beside the device. */
export function Schematic({ circuit, className, ...stage }: SchematicProps) {
  const id = useId();
  const Drawing = DRAWINGS[circuit];
  const { title, description } = circuitOf(circuit);
  return (
    <svg
      role="img"
      aria-labelledby={`${id}-title`}
      aria-describedby={`${id}-description`}
      viewBox="0 0 204 200"
      width="204"
      height="200"
      className={classNames("block max-w-full", className)}
    >
      <title id={`${id}-title`}>{`Schematic: ${title}`}</title>
      <desc id={`${id}-description`}>{description}</desc>
      <Drawing {...stage} />
    </svg>
  );
}
