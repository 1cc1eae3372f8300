import type { BriefInput } from "#shared/schemas/brief";

/** Who works at the demo teams, by role; invented. */
export const PEOPLE: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  "Tidewater Acoustics": {
    owner: "S. Okonjo-Vale",
    designer: "I. Marlow",
    reviewer: "R. Adeyemi-Holt",
    librarian: "P. Lindqvist",
    buyer: "T. Castellane",
    viewer: "J. Farrow",
  },
  "Lantern Audio Works": {
    owner: "H. Brightwell",
    designer: "M. Osei-Kemp",
    reviewer: "D. Vantongeren",
    librarian: "A. Sorley",
    buyer: "L. Pemberly",
    viewer: "N. Quist",
  },
};

const decades = (series: "E24" | "E96", ranges: { divider: number; drain: number; source: number }) => ({
  divider: { series, min: ranges.divider, max: ranges.divider * 1000 },
  drain: { series, min: ranges.drain, max: ranges.drain * 1000 },
  source: { series, min: ranges.source, max: ranges.source * 1000 },
});

type StoryBrief = {
  team: string;
  name: string;
  brief: BriefInput;
  stage: { name: string; note: string } | null;
};

/** The demo's briefs, and the stage that the designer kept from each. */
export const BRIEFS: readonly StoryBrief[] = [
  {
    team: "Tidewater Acoustics",
    name: "Hydrophone first stage",
    brief: {
      polarity: "n",
      rail: { volts: 12, tolerance: 0.05 },
      load: { ohms: 10e3 },
      source: { ohms: 1e3 },
      swing: { peak: 1.5 },
      gain: { min: 4 },
      inputResistance: { min: 220e3 },
      supplyCurrent: { max: 2.5e-3 },
      lowCorner: { hertz: 10 },
      ambient: { min: -10, max: 50 },
      sourceDrop: { min: 1 },
      resistors: { tolerance: 0.01, ...decades("E24", { divider: 10e3, drain: 100, source: 10 }) },
      parts: { mounting: "surface", stockedOnly: true },
      buildQuantity: 500,
    },
    stage: {
      name: "Hydrophone first stage, board A",
      note: "The drop across RS holds the current over the threshold spread.",
    },
  },
  {
    team: "Tidewater Acoustics",
    name: "Line driver, 24 V",
    brief: {
      polarity: "n",
      rail: { volts: 24, tolerance: 0.05 },
      load: { ohms: 2e3 },
      source: { ohms: 10e3 },
      swing: { peak: 4 },
      gain: { min: 3 },
      inputResistance: { min: 47e3 },
      supplyCurrent: { max: 20e-3 },
      ambient: { min: 0, max: 60 },
      resistors: { tolerance: 0.01, ...decades("E24", { divider: 10e3, drain: 100, source: 10 }) },
      parts: { stockedOnly: true },
      buildQuantity: 200,
    },
    stage: { name: "Line driver output", note: "Runs warm: keep it clear of the electrolytics." },
  },
  {
    team: "Tidewater Acoustics",
    name: "Coin-cell buffer",
    brief: {
      polarity: "n",
      rail: { volts: 3, tolerance: 0.1 },
      load: { ohms: 100e3 },
      source: { ohms: 100e3 },
      swing: { peak: 0.3 },
      inputResistance: { min: 1e6 },
      supplyCurrent: { max: 200e-6 },
      ambient: { min: 0, max: 40 },
      sourceResistor: "unbypassed",
      resistors: {
        tolerance: 0.01,
        divider: { series: "E24", min: 100e3, max: 10e6 },
        drain: { series: "E24", min: 1e3, max: 1e6 },
        source: { series: "E24", min: 100, max: 100e3 },
      },
      parts: { mounting: "surface", stockedOnly: true },
      buildQuantity: 1000,
    },
    stage: { name: "Coin-cell buffer, first try", note: "" },
  },
  {
    team: "Lantern Audio Works",
    name: "Headphone stage, 18 V",
    brief: {
      rail: { volts: 18, tolerance: 0.05 },
      load: { ohms: 4.7e3 },
      swing: { peak: 2 },
      ambient: { min: 10, max: 45 },
      resistors: decades("E24", { divider: 10e3, drain: 100, source: 10 }),
    },
    stage: { name: "Headphone stage, left", note: "" },
  },
];
