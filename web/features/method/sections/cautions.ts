import type { CautionCode } from "#shared/schemas/caution";

/** Every caution and when it appears; a new one can't be left out. */
export const CAUTIONS: Record<CautionCode, { title: string; when: string }> = {
  "high-rail": {
    title: "High rail",
    when: "The rail with its tolerance can go above 60 V d.c., the touch-safe limit of common product-safety standards. Follow local rules; qualified people only.",
  },
  "hot-surface": {
    title: "Hot surface",
    when: "The junction reaches 60 °C or more at the highest ambient temperature of the brief.",
  },
  electrostatic: {
    title: "Electrostatic discharge",
    when: "Always: a MOSFET's gate is damaged by a charge that nobody feels. The note names the resistance that leads charge away.",
  },
  "linear-mode": {
    title: "Linear mode",
    when: "The part is rated for 1 A or more, so it is likely made for switching; held in saturation its cells may not share the current, and hot spots form inside the power rating. Check the safe operating area.",
  },
  "capacitor-voltage": {
    title: "Capacitor voltage and polarity",
    when: "Always: the voltage that each capacitor must stand, with the rail at the top of its tolerance.",
  },
  "low-overdrive": {
    title: "Low overdrive",
    when: "The overdrive is below 0.1 V, where a real device leaves the square law (moderate inversion) and these figures are optimistic.",
  },
  "gate-voltage": {
    title: "Gate voltage",
    when: "The divider's voltage, with the rail at the top of its tolerance, is above the gate rating: at power-up the source is still at ground.",
  },
  "drain-current": {
    title: "Drain current",
    when: "Driven to the edge of saturation, the drain carries more than its rating.",
  },
  lifecycle: {
    title: "Lifecycle",
    when: "The part is not recommended for new designs, on last-time buy, or obsolete.",
  },
  "verify-on-bench": {
    title: "Verify on the bench",
    when: "Always: figures are for design. Not for use where failure can hurt someone without a licensed engineer's own check.",
  },
};
