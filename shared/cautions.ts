import { figureStage, type StageFigures } from "./bias/stage-sheet";
import type { Brief } from "./schemas/brief";
import type { Caution, CautionCode } from "./schemas/caution";
import type { Resistors } from "./schemas/circuit";
import type { Part } from "./schemas/part";
import { formatQuantity } from "./values/engineering";

/** Above this a d.c. rail is not touch-safe: 60 V, the limit that common product-safety standards set for ripple-free d.c. */
const TOUCH_SAFE_VOLTS = 60;
/** A junction at this temperature means a package too hot to touch; common practice for metal surfaces. */
const HOT_CELSIUS = 60;
/** Below this overdrive a real device leaves the square law (moderate inversion); common practice. */
const LEAST_OVERDRIVE = 0.1;
/** From this current up, parts are built for switching, and their cells may not share current in linear mode. */
const POWER_PART_AMPERES = 1;
/** A supply line is said to be at risk from these lifecycles. */
const LIFECYCLE_WORDS = {
  active: null,
  "not-recommended": "not recommended for new designs",
  "last-time-buy": "on last-time buy",
  obsolete: "obsolete",
} as const;

type Stage = {
  part: Part;
  brief: Brief;
  /** At 25 °C. */
  nominal: StageFigures;
  /** At the hottest ambient of the brief. */
  hot: StageFigures;
};
type Rule = (stage: Stage) => string | null;

const volts = (value: number) => formatQuantity(value, "V");
const exactVolts = (value: number) => formatQuantity(value, "V", { exact: true });

/** The one list of cautions: each says when it applies, with the stage's own figure. */
const RULES: Record<CautionCode, Rule> = {
  "high-rail": ({ brief, nominal }) => {
    const { vdd, vss } = nominal.values;
    const highest = (vdd + vss) * (1 + brief.rail.tolerance);
    if (highest <= TOUCH_SAFE_VOLTS) return null;
    const between = vss > 0 ? "Between the rails there can be" : "The rail can reach";
    return `${between} ${volts(highest)}, above the 60 V d.c. that safety standards treat as safe to touch. Follow your local rules; qualified people only.`;
  },
  "hot-surface": ({ brief, hot }) => {
    if (hot.thermal.junction < HOT_CELSIUS) return null;
    return `The junction reaches ${formatQuantity(hot.thermal.junction, "°C")} at ${formatQuantity(brief.ambient.max, "°C", { exact: true })} ambient. The package can burn fingers; keep heat-sensitive parts away.`;
  },
  "low-overdrive": ({ nominal: { bias } }) => {
    if (bias.region === "cutoff" || bias.overdrive >= LEAST_OVERDRIVE) return null;
    return `The overdrive is ${volts(bias.overdrive)}. Below about 0.1 V a real device leaves the square law, so these figures are optimistic.`;
  },
  "gate-voltage": ({ part, brief, hot }) => {
    const { vss } = hot.values;
    const highest = (vss > 0 ? vss : hot.bias.vg) * (1 + brief.rail.tolerance);
    if (highest <= part.vgss) return null;
    const when =
      vss > 0
        ? `Until the source has risen at power-up there are ${volts(highest)} between gate and source`
        : `The gate sits at ${volts(highest)} while the source is still at ground at power-up`;
    return `${when}, above the ${exactVolts(part.vgss)} gate rating. Add a clamp or choose another part.`;
  },
  "drain-current": ({ part, hot }) => {
    const peak = hot.bias.transition?.id ?? hot.bias.id;
    if (peak <= part.idMax) return null;
    return `Driven to the edge of saturation the drain carries ${formatQuantity(peak, "A")}, above its ${formatQuantity(part.idMax, "A", { exact: true })} rating.`;
  },
  "linear-mode": ({ part, hot }) => {
    if (part.idMax < POWER_PART_AMPERES) return null;
    return `This is a switching-type power MOSFET held in linear mode at ${volts(hot.bias.vds)} and ${formatQuantity(hot.bias.id, "A")}. Hot spots can form well inside the power rating: check the safe operating area.`;
  },
  electrostatic: ({ hot }) =>
    `Electrostatic discharge can damage the gate. Handle on a grounded mat; ${formatQuantity(hot.bias.inputResistance, "Ω")} at the gate leaks little charge away.`,
  "capacitor-voltage": ({ brief, hot }) => {
    const high = 1 + brief.rail.tolerance;
    // The gate may sit at ground itself, and then the input's own level is all there is.
    const sits = hot.nodes.gate === 0 ? [] : [`input capacitor ${volts(hot.nodes.gate * high)}`];
    if (brief.load.ohms !== null)
      sits.push(`output capacitor ${volts(brief.rail.volts * high)} at switch-on`);
    if (hot.values.sourceBypassed && hot.values.rs > 0)
      sits.push(`bypass capacitor ${volts(Math.abs(hot.nodes.source) * high)}`);
    if (sits.length === 0) sits.push("input capacitor whatever its signal source sits at");
    return `Capacitors must stand the voltage across them: ${sits.join(", ")}. Mind the polarity of electrolytics.`;
  },
  lifecycle: ({ part }) => {
    const words = LIFECYCLE_WORDS[part.lifecycle];
    return words && `${part.partNumber} is ${words} (${part.stock.toLocaleString("en-US")} in stock).`;
  },
  "verify-on-bench": () =>
    "Figures are for design; verify on the bench. Not for use where failure can hurt someone without a licensed engineer's own check.",
};

/**
 * The cautions that apply to a stage, in the order of the list, each with its own figure. Heat and voltages are taken
 * at the hottest ambient of the brief, where they bite first.
 */
export function cautionsFor(part: Part, brief: Brief, resistors: Resistors): Caution[] {
  const stage: Stage = {
    part,
    brief,
    nominal: figureStage(part, brief, resistors),
    hot: figureStage(part, brief, resistors, brief.ambient.max),
  };
  const cautions: Caution[] = [];
  for (const [code, rule] of Object.entries(RULES) as [CautionCode, Rule][]) {
    const message = rule(stage);
    if (message) cautions.push({ code, message });
  }
  return cautions;
}
