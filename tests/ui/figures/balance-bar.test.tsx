import { cleanup, render, screen } from "@testing-library/react";
import fc from "fast-check";
import { afterEach, expect, test } from "vitest";
import { BalanceBar } from "../../../web/figures/balance-bar";

afterEach(cleanup);

type Extent = { start: number; width: number };

function lengths(container: HTMLElement, part: "room" | "assured"): Extent[] {
  return [...container.querySelectorAll(`[data-part="${part}"]`)].map((bar) => ({
    start: Number.parseFloat(bar.getAttribute("x") ?? ""),
    width: Number.parseFloat(bar.getAttribute("width") ?? ""),
  }));
}

test("says both rooms, what limits and what every build keeps", () => {
  render(
    <BalanceBar
      towardOhmic={4.1}
      towardCutoff={4.02}
      assured={{ towardOhmic: 3, towardCutoff: 2.83 }}
      scale={5}
      label="OVL2206N"
    />,
  );
  expect(screen.getByRole("img").getAttribute("aria-label")).toBe(
    "OVL2206N: 4.10 V of room toward the ohmic region, 4.02 V toward cutoff; cutoff limits. " +
      "Every build has 3.00 V and 2.83 V.",
  );
});

test("says so where no swing is assured and where the Q-point is centred", () => {
  render(
    <BalanceBar towardOhmic={2} towardCutoff={2} assured={{ towardOhmic: 0, towardCutoff: 1 }} scale={2} />,
  );
  expect(screen.getByRole("img").getAttribute("aria-label")).toBe(
    "2.00 V of room toward the ohmic region, 2.00 V toward cutoff; the Q-point is centred. " +
      "No swing is assured for every build.",
  );
});

test("draws lengths in proportion to volts on the common scale, with the Q-point in the middle", () => {
  const { container } = render(
    <BalanceBar towardOhmic={4} towardCutoff={1} assured={{ towardOhmic: 3, towardCutoff: 0.5 }} scale={5} />,
  );
  // Half the width, 50 %, stands for 5 V: 10 % a volt.
  expect(lengths(container, "room")).toEqual([
    { start: 10, width: 40 },
    { start: 50, width: 10 },
  ]);
  expect(lengths(container, "assured")).toEqual([
    { start: 20, width: 30 },
    { start: 50, width: 5 },
  ]);
  expect(container.querySelector("circle")?.getAttribute("cx")).toBe("50%");
});

test("has the same proportions in a row and on a sheet", () => {
  const rooms = { towardOhmic: 3.3, towardCutoff: 2.1, assured: null, scale: 4 };
  const row = render(<BalanceBar {...rooms} size="row" />).container;
  const sheet = render(<BalanceBar {...rooms} size="sheet" />).container;
  expect(lengths(sheet, "room")).toEqual(lengths(row, "room"));
});

test("never leaves its width, whatever the rooms", () => {
  const volts = fc.double({ min: 0, max: 500, noNaN: true });
  fc.assert(
    fc.property(volts, volts, volts, volts, volts, (ohmic, cutoff, assuredOhmic, assuredCutoff, scale) => {
      const { container, unmount } = render(
        <BalanceBar
          towardOhmic={ohmic}
          towardCutoff={cutoff}
          assured={{ towardOhmic: assuredOhmic, towardCutoff: assuredCutoff }}
          scale={scale}
        />,
      );
      const room = lengths(container, "room");
      const assured = lengths(container, "assured");
      unmount();
      for (const { start, width } of [...room, ...assured]) {
        expect(start).toBeGreaterThanOrEqual(0);
        expect(start + width).toBeLessThanOrEqual(100);
        expect(width).toBeGreaterThanOrEqual(0);
      }
      for (const side of [0, 1]) expect(assured[side].width).toBeLessThanOrEqual(room[side].width);
    }),
    { numRuns: 60 },
  );
});
