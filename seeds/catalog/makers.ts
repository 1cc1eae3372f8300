import type { Polarity } from "#shared/schemas/quantity";
import type { KindName } from "./kinds";
import { type PackageName, packageNames } from "./packages";

/** Threshold sorting: 0 unsorted, 1 low, 2 high. */
export type Grade = 0 | 1 | 2;

/** What tells one part of a maker from every other. */
interface Variant {
  polarity: Polarity;
  /** The die's number among the maker's dies of this polarity, from 1. */
  die: number;
  /** The part's number among the maker's parts of this polarity, from 1. */
  listed: number;
  package: PackageName;
  /** V. */
  vdss: number;
  grade: Grade;
}

export interface Maker {
  name: string;
  makes: Partial<Record<KindName, number>>;
  packages: readonly PackageName[];
  /** The greatest drain-source rating it offers, V. */
  vdssLimit: number;
  /** Its prices beside the others', as a factor. */
  priceFactor: number;
  /** Its own numbering; no real maker's scheme. */
  number(variant: Variant): string;
}

const twoDigits = (number: number) => String(number).padStart(2, "0");
const threeDigits = (number: number) => String(number).padStart(3, "0");
const letter = (polarity: Polarity) => polarity.toUpperCase();
const position = (name: PackageName) => packageNames.indexOf(name) + 1;

const ketteringOutlines: Record<PackageName, string> = {
  "SC-70": "B",
  "SOT-323": "C",
  "DFN-3": "F",
  "SOT-23": "E",
  "TO-92": "L",
  "SOT-89": "J",
  "SOT-223": "R",
  "TO-252": "T",
  "TO-220": "W",
};

const halvardOutlines: Record<PackageName, number> = {
  "SC-70": 2,
  "SOT-323": 3,
  "DFN-3": 11,
  "SOT-23": 4,
  "TO-92": 6,
  "SOT-89": 7,
  "SOT-223": 12,
  "TO-252": 15,
  "TO-220": 17,
};

/** Ten invented makers. `makes` says how many of its dies, beside the other makers', are of each kind. */
export const makers: readonly Maker[] = [
  {
    name: "Ovalle Devices",
    makes: { "small-signal": 4, "logic-level": 3, "medium-power": 1 },
    packages: ["SC-70", "SOT-323", "DFN-3", "SOT-23", "TO-92", "SOT-89", "SOT-223"],
    vdssLimit: 100,
    priceFactor: 0.95,
    number: ({ polarity, die, package: outline, vdss, grade }) =>
      `OVL${Math.floor(vdss / 10) % 10}${position(outline) + 1}${twoDigits(die)}${letter(polarity)}${["", "L", "H"][grade]}`,
  },
  {
    name: "Kettering Row",
    makes: { array: 2, "small-signal": 4, "logic-level": 3 },
    packages: ["SC-70", "SOT-323", "DFN-3", "SOT-23", "TO-92", "SOT-89", "SOT-223"],
    vdssLimit: 250,
    priceFactor: 1.05,
    number: ({ polarity, die, package: outline, grade }) =>
      `KT-${letter(polarity)}${300 + die}${ketteringOutlines[outline]}${["", "2", "3"][grade]}`,
  },
  {
    name: "Marrin & Oake",
    makes: { "small-signal": 4, "medium-power": 3, depletion: 1 },
    packages: ["SOT-323", "SOT-23", "TO-92", "SOT-89", "SOT-223", "TO-252", "TO-220"],
    vdssLimit: 400,
    priceFactor: 1.1,
    number: ({ polarity, die, package: outline, grade }) =>
      `MRN-${polarity === "n" ? 1 : 2}${twoDigits(die)}${(position(outline) + 6) % 10}${["", "L", "H"][grade]}`,
  },
  {
    name: "Halvard Semi",
    makes: { "small-signal": 3, "logic-level": 3, "medium-power": 2, power: 2 },
    packages: packageNames,
    vdssLimit: 250,
    priceFactor: 1,
    number: ({ polarity, die, package: outline, grade }) =>
      `HS${30 + die}${letter(polarity)}-${twoDigits(halvardOutlines[outline] + 20 * grade)}`,
  },
  {
    name: "Brackwater",
    makes: { array: 1, "small-signal": 3, "logic-level": 2, "medium-power": 1, power: 1 },
    packages: packageNames.filter((name) => name !== "DFN-3"),
    vdssLimit: 250,
    priceFactor: 0.85,
    number: ({ polarity, listed }) => `BX.${letter(polarity)}.${threeDigits(listed)}`,
  },
  {
    name: "Dunlin Micro",
    makes: { array: 4, "small-signal": 4, "logic-level": 1 },
    packages: ["SC-70", "DFN-3", "SOT-23", "TO-92"],
    vdssLimit: 100,
    priceFactor: 1.15,
    number: ({ polarity, die, package: outline, grade }) =>
      `DUN-${letter(polarity)}${40 + die}${outline === "SOT-23" ? "" : ketteringOutlines[outline]}${["", ".1", ".2"][grade]}`,
  },
  {
    name: "Quillfen",
    makes: { "small-signal": 3, "medium-power": 3, power: 2, depletion: 1 },
    packages: ["SOT-23", "TO-92", "SOT-89", "SOT-223", "TO-252", "TO-220"],
    vdssLimit: 450,
    priceFactor: 1.2,
    number: ({ polarity, die, package: outline, vdss, grade }) =>
      `QUIL${vdss}-${letter(polarity)}${twoDigits(die)}${"ABCDEFGHJ"[position(outline) - 1]}${["", "x", "y"][grade]}`,
  },
  {
    name: "Ashgarth & Pell",
    makes: { "medium-power": 3, power: 4 },
    packages: ["TO-92", "SOT-89", "SOT-223", "TO-252", "TO-220"],
    vdssLimit: 450,
    priceFactor: 1.1,
    number: ({ polarity, die, package: outline, grade }) =>
      `PELL.${twoDigits(die)}${letter(polarity)}.${["K", "M", "R"][grade]}${position(outline)}`,
  },
  {
    name: "Tolverne",
    makes: { "logic-level": 4, "medium-power": 2, power: 2 },
    packages: ["SOT-323", "DFN-3", "SOT-23", "SOT-89", "SOT-223", "TO-252", "TO-220"],
    vdssLimit: 200,
    priceFactor: 0.9,
    number: ({ polarity, die, package: outline, grade }) =>
      `TOLV${position(outline)}${letter(polarity)}${twoDigits(die)}${["", "-K", "-M"][grade]}`,
  },
  {
    name: "Skerrivane",
    makes: { array: 2, "small-signal": 4, "logic-level": 2 },
    packages: ["SC-70", "SOT-323", "SOT-23", "TO-92", "SOT-89"],
    vdssLimit: 150,
    priceFactor: 0.95,
    number: ({ polarity, die, package: outline, grade }) =>
      `VANE-${20 + die}${letter(polarity)}${position(outline)}${["", "a", "b"][grade]}`,
  },
];
