import { screen, within } from "@testing-library/react";
import { HttpResponse, http } from "msw";
import { describe, expect, it } from "vitest";
import { briefSchema } from "#shared/schemas/brief";
import { CAUTION_CODES } from "#shared/schemas/caution";
import type { Stage } from "#shared/schemas/stage";
import { MethodPage } from "../../../web/features/method/method-page";
import { formulaInWords, parseFormula } from "../../../web/features/method/parse-formula";
import { StagePage } from "../../../web/features/stages/stage-page";
import { buildPart } from "../../support/build-part";
import { renderAt } from "../support/render";
import { API, playServer, server, signedInAs } from "../support/server";

playServer();

const someone = { id: "u1", name: "S. Omeone" };

const STAGE: Stage = {
  id: 4,
  name: "First stage",
  note: "",
  version: 1,
  part: buildPart(),
  resistors: { r1: 1.8e6, r2: 750e3, rd: 2700, rs: 1200 },
  brief: briefSchema.parse({
    rail: { volts: 12 },
    load: { ohms: 10e3 },
    swing: { peak: 1 },
    distortion: { max: 0.05 },
    ambient: { min: 0, max: 50 },
  }),
  origin: null,
  createdBy: someone,
  updatedBy: someone,
  createdAt: "2026-11-02T09:00:00.000Z",
  updatedAt: "2026-11-03T09:00:00.000Z",
};

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
    server.use(http.get(`${API}/stages/4`, () => HttpResponse.json(STAGE)));
    renderAt("/stages/4", { "/stages/:id": <StagePage /> });
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
