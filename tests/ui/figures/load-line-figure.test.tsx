import { act, cleanup, fireEvent, render, screen } from "@testing-library/react";
import { userEvent } from "@testing-library/user-event";
import { afterEach, describe, expect, test } from "vitest";
import type { FigurePoint } from "#shared/bias/figure-data";
import { LoadLineFigure } from "../../../web/figures/load-line-figure";
import { buildLoadLineData, transition } from "./line-data";

afterEach(cleanup);

type Drawing = { part: (name: string) => Element; toData: (x: number, y: number) => FigurePoint };

/** Reads the scales off the printed ticks, as somebody with a ruler would. */
function draw(data = buildLoadLineData()): Drawing {
  const { container } = render(<LoadLineFigure data={data} />);
  const ticks = (axis: "volts" | "current", attribute: "x" | "y") =>
    [...container.querySelectorAll(`[data-tick="${axis}"]`)].map((tick) => ({
      value: Number(tick.textContent),
      at: Number(tick.getAttribute(attribute)),
    }));
  const reader = (marks: { value: number; at: number }[]) => {
    const [first, last] = [marks[0], marks[marks.length - 1]];
    return (at: number) =>
      first.value + ((at - first.at) / (last.at - first.at)) * (last.value - first.value);
  };
  const volts = reader(ticks("volts", "x"));
  const milliamperes = reader(ticks("current", "y"));
  return {
    part: (name) => {
      const element = container.querySelector(`[data-part="${name}"]`);
      if (!element) throw new Error(`nothing drawn as "${name}"`);
      return element;
    },
    toData: (x, y) => ({ vds: volts(x), id: milliamperes(y) / 1000 }),
  };
}

function centre(element: Element): [number, number] {
  return [Number(element.getAttribute("cx")), Number(element.getAttribute("cy"))];
}

function points(element: Element): [number, number][] {
  const numbers = (element.getAttribute("d") ?? "").match(/-?\d+(\.\d+)?/g)?.map(Number) ?? [];
  return numbers.flatMap((x, index) =>
    index % 2 === 0 ? [[x, numbers[index + 1]] as [number, number]] : [],
  );
}

function expectPoint(actual: FigurePoint, wanted: FigurePoint) {
  expect(actual.vds).toBeCloseTo(wanted.vds, 2);
  expect(actual.id * 1000).toBeCloseTo(wanted.id * 1000, 2);
}

describe("where things are drawn", () => {
  test("the Q-point, the transition point and cutoff lie at their volts and amperes", () => {
    const { part, toData } = draw();
    expectPoint(toData(...centre(part("q"))), { vds: 6, id: 6e-3 });
    expectPoint(toData(...centre(part("transition"))), transition);
    expectPoint(toData(...centre(part("cutoff"))), { vds: 9, id: 0 });
  });

  test("both load lines run from end to end", () => {
    const { part, toData } = draw();
    const [dcFrom, dcTo] = points(part("dc-line"));
    expectPoint(toData(...dcFrom), { vds: 0, id: 12e-3 });
    expectPoint(toData(...dcTo), { vds: 12, id: 0 });
    const [acFrom, acTo] = points(part("ac-line"));
    expectPoint(toData(...acFrom), { vds: 0, id: 18e-3 });
    expectPoint(toData(...acTo), { vds: 9, id: 0 });
  });

  test("the excursion reaches as far each way as the nearer limit, here cutoff", () => {
    const { part, toData } = draw();
    const [ohmicEnd, cutoffEnd] = points(part("excursion"));
    expectPoint(toData(...ohmicEnd), { vds: 3, id: 12e-3 });
    expectPoint(toData(...cutoffEnd), { vds: 9, id: 0 });
  });

  test("the wave swings along the same axis of volts, and time runs downward", () => {
    const { part, toData } = draw();
    const path = points(part("wave"));
    const volts = path.map(([x]) => toData(x, 0).vds);
    expect(Math.min(...volts)).toBeCloseTo(4, 2);
    expect(Math.max(...volts)).toBeCloseTo(8, 2);
    const heights = path.map(([, y]) => y);
    expect(heights).toEqual([...heights].sort((a, b) => a - b));
  });

  test("the outline of the spread passes through its corners", () => {
    const { part, toData } = draw();
    const outline = points(part("spread")).map(([x, y]) => toData(x, y));
    expectPoint(outline[0], { vds: 5, id: 7e-3 });
    expectPoint(outline[2], { vds: 7, id: 5e-3 });
  });
});

describe("what it says", () => {
  test("a screen reader gets the figure in sentences", () => {
    draw();
    expect(screen.getByRole("img").querySelector("title")?.textContent).toBe(
      "Load lines on a 12.0 V rail. The Q-point rests at 6.00 V and 6.00 mA. " +
        "The a.c. line runs from the edge of saturation at 1.89 V and 14.2 mA to cutoff at 9.00 V. " +
        "Room at the output: 4.11 V toward the ohmic region, 3.00 V toward cutoff. " +
        "Over the spread the Q-point lies between 4.50 V and 7.50 V, 5.00 mA and 7.00 mA.",
    );
  });

  test("labels give the Q-point and both rooms", () => {
    draw();
    for (const words of ["Q 6.00 V, 6.00 mA", "4.11 V of room", "3.00 V of room", "edge of saturation"]) {
      expect(screen.getByText(words)).toBeTruthy();
    }
  });

  test("a wave that clips says where", () => {
    draw(buildLoadLineData({ clipped: { towardOhmic: false, towardCutoff: true } }));
    expect(screen.getByText("3.00 V of room, clips")).toBeTruthy();
    expect(screen.getByText("4.11 V of room")).toBeTruthy();
    expect(screen.getByRole("img").textContent).toContain("The wave drawn clips at cutoff.");
  });

  test("a P-channel stage is drawn in magnitudes and says so", () => {
    draw(buildLoadLineData({ polarity: "p" }));
    expect(screen.getByRole("slider").getAttribute("aria-label")).toContain("|VDS|");
    expect(screen.getByRole("img").textContent).toContain("P-channel, in magnitudes");
  });

  test("a stage without a signal has no line to walk and says why", () => {
    const off = { acLine: null, transition: null, cutoff: null, room: null, wave: [] };
    draw(buildLoadLineData(off));
    expect(screen.queryByRole("slider")).toBeNull();
    expect(screen.getByRole("img").textContent).toContain("its Q-point is not in saturation");
  });

  test("load lines that run together share one label", () => {
    const together = buildLoadLineData();
    draw({ ...together, acLine: together.dcLine });
    expect(screen.getByText("a.c. and d.c. line")).toBeTruthy();
    expect(screen.queryByText("d.c. line")).toBeNull();
  });
});

describe("reading values", () => {
  test("the keyboard walks the a.c. line from the Q-point to its ends", async () => {
    const user = userEvent.setup();
    draw();
    const slider = screen.getByRole("slider");
    await user.tab();
    expect(document.activeElement).toBe(slider);
    expect(slider.getAttribute("aria-valuetext")).toBe(
      "Q-point, VDS 6.00 V, ID 6.00 mA, output 0 V from rest",
    );
    await user.keyboard("{End}");
    expect(slider.getAttribute("aria-valuetext")).toBe(
      "cutoff, VDS 9.00 V, ID 0 A, output +3.00 V from rest",
    );
    await user.keyboard("{Home}");
    expect(slider.getAttribute("aria-valuetext")).toBe(
      "transition point, VDS 1.89 V, ID 14.2 mA, output −4.11 V from rest",
    );
    await user.keyboard("{PageUp}");
    expect(slider.getAttribute("aria-valuetext")).toContain("Q-point");
    await user.keyboard("{ArrowRight}");
    // A sixtieth of the way from 1.886 V to 9 V is 0.1186 V; 2 mA/V takes 0.237 mA off.
    expect(slider.getAttribute("aria-valuetext")).toBe("VDS 6.12 V, ID 5.76 mA, output +0.119 V from rest");
    expect(Number(slider.getAttribute("aria-valuenow"))).toBeCloseTo(6.1186, 3);
  });

  test("values stand in the drawing while they are read and go when the focus leaves", () => {
    const { part } = draw();
    const slider = screen.getByRole("slider");
    act(() => slider.focus());
    expect(part("readout").textContent).toContain("6.00 V");
    fireEvent.keyDown(slider, { key: "End" });
    expect(part("readout").textContent).toContain("+3.00 V");
    act(() => slider.blur());
    expect(() => part("readout")).toThrow();
  });
});
