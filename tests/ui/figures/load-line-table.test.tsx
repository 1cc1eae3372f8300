import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, expect, test } from "vitest";
import { LoadLineTable } from "../../../web/figures/load-line-table";
import { buildLoadLineData } from "./line-data";

afterEach(cleanup);

function rows(): string[][] {
  return screen
    .getAllByRole("row")
    .slice(1)
    .map((row) => [...row.children].map((cell) => cell.textContent ?? ""));
}

test("lists every point that the figure marks, with its values", () => {
  render(<LoadLineTable data={buildLoadLineData()} />);
  expect(rows()).toEqual([
    ["transition point, edge of saturation", "1.89 V", "14.2 mA", "−4.11 V"],
    ["Q-point", "6.00 V", "6.00 mA", "0 V"],
    ["cutoff end of the a.c. line", "9.00 V", "0 A", "+3.00 V"],
    ["d.c. line, full current", "0 V", "12.0 mA", "—"],
    ["d.c. line, no current", "12.0 V", "0 A", "—"],
    ["corner 1 of the spread", "5.00 V", "7.00 mA", "—"],
    ["corner 2 of the spread", "7.00 V", "5.00 mA", "—"],
  ]);
});

test("says that a P-channel stage's figures are magnitudes", () => {
  render(<LoadLineTable data={buildLoadLineData({ polarity: "p" })} />);
  expect(screen.getByRole("table", { name: /in magnitudes/ })).toBeTruthy();
});
