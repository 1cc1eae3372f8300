import { describe, expect, it } from "vitest";
import { solveStage } from "#shared/bias/solve-stage";
import { biasSchema } from "#shared/schemas/bias";
import { buildStageValues } from "../../support/build-stage";

describe("a feedback resistor that passes more than the device takes", () => {
  // By ngspice the output of this stage rises from its lowest input to its highest: it doesn't invert at all.
  const bias = solveStage(
    { vt: 1.2, k: 3.77e-3, lambda: 0 },
    buildStageValues({
      circuit: "drain-feedback",
      vdd: 19.8,
      r2: 327,
      rg: 237,
      rd: 213,
      rs: 202,
      sourceBypassed: false,
    }),
  );

  it("turns the gain over", () => {
    expect(bias.gain).toBeGreaterThan(0);
  });

  it("leaves no swing, as far off centre as can be", () => {
    expect(bias.swing).toEqual({ towardCutoff: 0, towardOhmic: 0, symmetric: 0 });
    expect(bias.centringError).toBe(1);
    expect(biasSchema.safeParse(bias).success).toBe(true);
  });
});
