import type { CircuitName } from "#shared/schemas/circuit";
import type { Circuit } from "./circuit";
import { DRAIN_FEEDBACK } from "./drain-feedback/circuit";
import { FOLLOWER } from "./follower/circuit";
import { FOUR_RESISTOR } from "./four-resistor/circuit";
import { NEGATIVE_RAIL } from "./negative-rail/circuit";
import { SPLIT_SOURCE } from "./split-source/circuit";

/** Every circuit the engine knows. */
const CIRCUITS: Record<CircuitName, Circuit> = {
  "four-resistor": FOUR_RESISTOR,
  "split-source": SPLIT_SOURCE,
  follower: FOLLOWER,
  "drain-feedback": DRAIN_FEEDBACK,
  "negative-rail": NEGATIVE_RAIL,
};

/** The circuit of a name. */
export function circuitOf(name: CircuitName): Circuit {
  return CIRCUITS[name];
}
