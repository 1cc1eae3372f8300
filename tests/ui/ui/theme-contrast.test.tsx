import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";

const css = readFileSync(join(import.meta.dirname, "../../../web/theme.css"), "utf8");
const palette = new Map(
  [...css.matchAll(/--color-([\w-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\)/g)].map(
    ([, name, light, dark]) => [name, { light, dark }],
  ),
);

/** WCAG 2.2, "relative luminance": https://www.w3.org/TR/WCAG22/#dfn-relative-luminance */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** WCAG 2.2, "contrast ratio": https://www.w3.org/TR/WCAG22/#dfn-contrast-ratio */
function contrast(a: string, b: string): number {
  const [darker, lighter] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (lighter + 0.05) / (darker + 0.05);
}

function colour(name: string, set: "light" | "dark"): string {
  const found = palette.get(name);
  if (!found) throw new Error(`the theme has no colour "${name}"`);
  return found[set];
}

const WORDS = ["ink", "quiet", "ember", "saturation-ink", "ohmic", "cutoff-ink", "caution-ink"];
const MARKS = ["edge", "ember", "saturation", "ohmic", "cutoff", "caution"];
const GROUNDS = ["paper", "panel", "raised"];

describe.each(["light", "dark"] as const)("the %s set", (set) => {
  test.each(WORDS)("words in %s reach 4.5 to 1 on every ground (WCAG 1.4.3)", (name) => {
    for (const ground of GROUNDS) {
      expect(contrast(colour(name, set), colour(ground, set)), `on ${ground}`).toBeGreaterThanOrEqual(4.5);
    }
  });

  test.each(MARKS)("lines and marks in %s reach 3 to 1 on every ground (WCAG 1.4.11)", (name) => {
    for (const ground of GROUNDS) {
      expect(contrast(colour(name, set), colour(ground, set)), `on ${ground}`).toBeGreaterThanOrEqual(3);
    }
  });

  test("words on the main button and on a notice reach 4.5 to 1", () => {
    expect(contrast(colour("on-ember", set), colour("ember", set))).toBeGreaterThanOrEqual(4.5);
    expect(contrast(colour("paper", set), colour("ink", set))).toBeGreaterThanOrEqual(4.5);
  });
});

test("the formula gives 21 to 1 for black on white", () => {
  expect(contrast("#000000", "#ffffff")).toBeCloseTo(21, 10);
});

test("the light set is the one that was agreed", () => {
  const agreed = {
    paper: "#fbfaf6",
    panel: "#f3f1ea",
    ink: "#1b2430",
    quiet: "#5d6674",
    rule: "#dad6cb",
    ember: "#b8431f",
    saturation: "#2f7d5b",
    ohmic: "#6d4fa3",
    cutoff: "#6b7685",
    caution: "#a86500",
  };
  for (const [name, hex] of Object.entries(agreed)) expect(colour(name, "light"), name).toBe(hex);
});
