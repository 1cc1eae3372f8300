import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { CAUTION_CODES } from "#shared/schemas/caution";
import { MethodPage } from "../../../web/features/method/method-page";
import { formulaInWords, parseFormula } from "../../../web/features/method/parse-formula";
import { renderAt } from "../support/render";
import { playServer, signedInAs } from "../support/server";
import { BRIEF, buildStage, PAGES, playStage } from "../support/stages";

playServer();

describe("the method page", () => {
  it("can be read signed out, without asking the server anything", () => {
    // A request would fail the test: nothing is played.
    renderAt("/method", { "/method": <MethodPage /> });
    const entry = screen.getByRole("article", { name: "Centring error" });
    expect(within(entry).getByRole("math").getAttribute("aria-label")).toBe("c = (|U − D|) over (U + D)");
    expect(within(entry).getByText("Source.")).toBeTruthy();
  });

  it("explains every figure that a stage's sheet links to", async () => {
    signedInAs("designer");
    playStage(buildStage({ brief: { ...BRIEF, distortion: { max: 0.05 } } }));
    renderAt("/stages/4", PAGES);
    await screen.findByRole("link", { name: "Gain" });
    const ids = screen
      .getAllByRole("link")
      .map((link) => link.getAttribute("href")?.match(/^\/method#(.+)$/)?.[1])
      .filter((id) => id !== undefined);
    expect(ids.length).toBeGreaterThan(15);

    renderAt("/method", { "/method": <MethodPage /> });
    expect(ids.filter((id) => document.getElementById(id) === null)).toEqual([]);
  });

  it("has a contents list that leads to every part of it", () => {
    renderAt("/method", { "/method": <MethodPage /> });
    const links = within(screen.getByRole("navigation", { name: "Contents" })).getAllByRole("link");
    const targets = links.map((link) => document.getElementById((link.getAttribute("href") ?? "").slice(1)));
    expect(targets).not.toContain(null);
    for (const article of screen.getAllByRole("article")) expect(targets).toContain(article);
  });

  it("says of every caution when it appears", () => {
    renderAt("/method", { "/method": <MethodPage /> });
    for (const code of CAUTION_CODES) {
      expect(document.getElementById(`caution-${code}`)?.textContent, code).toMatch(/\w+\./);
    }
  });

  it("puts the focus where the address points", () => {
    renderAt("/method#overdrive", { "/method": <MethodPage /> });
    expect(document.activeElement).toBe(screen.getByRole("article", { name: "Overdrive voltage" }));
  });
});

describe("the formula notation", () => {
  it("tells symbols, subscripts, powers, roots and fractions apart", () => {
    expect(parseFormula("√{a}{x^2}/{V_{GS}}")).toEqual([
      { kind: "root", of: [{ kind: "symbol", text: "a" }] },
      {
        kind: "fraction",
        over: [
          { kind: "symbol", text: "x" },
          { kind: "sup", text: "2" },
        ],
        under: [
          { kind: "symbol", text: "V" },
          { kind: "sub", text: "GS" },
        ],
      },
    ]);
  });

  it("leaves words upright", () => {
    expect(parseFormula("min(U)")[0]).toEqual({ kind: "text", text: "min" });
  });

  it("is read out as one would say it", () => {
    expect(formulaInWords(parseFormula("K (V_{GS} − V_T)^2"))).toBe("K (V GS − V T ) squared");
    expect(formulaInWords(parseFormula("x^{−1.5}"))).toBe("x to the power −1.5");
  });

  it("refuses braces that don't match", () => {
    expect(() => parseFormula("{a}/{b")).toThrow(SyntaxError);
    expect(() => parseFormula("{a} b")).toThrow(SyntaxError);
  });
});
