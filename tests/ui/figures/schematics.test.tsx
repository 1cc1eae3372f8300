import { cleanup, render, screen, within } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { CIRCUITS, type CircuitName } from "#shared/schemas/circuit";
import { Schematic } from "../../../web/figures/schematics/schematic";

afterEach(cleanup);

/** Written down by hand, from the circuits' own drawings. */
const NAMES: Record<CircuitName, { title: string; resistors: string[] }> = {
  "four-resistor": { title: "Four-resistor common source", resistors: ["R1", "R2", "RD", "RS"] },
  "split-source": {
    title: "Common source, split source resistor",
    resistors: ["R1", "R2", "RD", "RS", "RS2"],
  },
  follower: { title: "Source follower", resistors: ["R1", "R2", "RS"] },
  "drain-feedback": { title: "Drain feedback", resistors: ["R2", "RD", "RG", "RS"] },
  "negative-rail": { title: "Common source, gate at ground", resistors: ["RD", "RG", "RS"] },
};

const drawn = (circuit: CircuitName, sourceResistor: "bypassed" | "unbypassed" | "none" = "bypassed") =>
  render(<Schematic circuit={circuit} sourceResistor={sourceResistor} channel="n" />).container;

const resistorsIn = (container: HTMLElement) =>
  [...container.querySelectorAll("text")]
    .map((text) => text.textContent ?? "")
    .filter((text) => text.startsWith("R"))
    .sort();

describe("a circuit's schematic", () => {
  it.each(CIRCUITS)("names the resistors of the %s circuit as its columns are named", (circuit) => {
    expect(resistorsIn(drawn(circuit))).toEqual(NAMES[circuit].resistors);
  });

  it.each(CIRCUITS)("says in words which circuit it is and what stands where: %s", (circuit) => {
    drawn(circuit);
    const image = screen.getByRole("img", { name: `Schematic: ${NAMES[circuit].title}` });
    const description = document.getElementById(image.getAttribute("aria-describedby") ?? "");
    expect(description?.textContent).toMatch(/^(R1|RG) .*(source|drain)/);
  });

  it("has the Q-point's dot once and no other colour", () => {
    for (const circuit of CIRCUITS) {
      const container = drawn(circuit);
      const colours = [...container.querySelectorAll("[class]")].flatMap((element) =>
        (element.getAttribute("class") ?? "").split(" ").filter((name) => /^(fill|stroke)-/.test(name)),
      );
      expect(colours.filter((name) => name === "fill-ember").length, circuit).toBe(1);
      expect(new Set(colours), circuit).toEqual(
        new Set(["fill-none", "stroke-ink", "fill-ink", "fill-ember"]),
      );
      cleanup();
    }
  });

  it("leaves out a source resistor that the brief leaves out", () => {
    expect(resistorsIn(drawn("four-resistor", "none"))).toEqual(["R1", "R2", "RD"]);
  });

  it("shows the negative rail only where the circuit has one", () => {
    for (const circuit of CIRCUITS) {
      const rails = within(drawn(circuit)).queryAllByText("−VSS").length;
      expect(rails, circuit).toBe(circuit === "negative-rail" ? 1 : 0);
      cleanup();
    }
  });
});
