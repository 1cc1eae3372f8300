/** SI prefixes by power of ten. The micro sign is U+00B5, which every Latin font subset has. */
export const PREFIXES = {
  p: -12,
  n: -9,
  µ: -6,
  m: -3,
  "": 0,
  k: 3,
  M: 6,
  G: 9,
  T: 12,
} as const;
export type Prefix = keyof typeof PREFIXES;

export type UnitSpec = {
  /** What a value in this unit is, for a sentence. */
  name: string;
  /** How to write one, for a sentence. */
  example: string;
  /** How people write the unit, beside its symbol; compatibility characters as Unicode's NFKC leaves them. */
  spellings: readonly string[];
  /** The prefixes that are written and read, rising; the others would only be slips (MV, kF). */
  prefixes: readonly Prefix[];
  /** Power of ten of the least value written without a prefix, where that is not 0: 0.358 V, but 35.8 mV. */
  bareFrom?: number;
  /** Power of ten that the symbol stands for, where that is not 0: a per cent is a hundredth. */
  power?: number;
  /** Significant digits where nobody asks, when not three. */
  digits?: number;
  /** Another unit's symbol differs by case alone. */
  caseMatters?: boolean;
};

/** Every unit the product shows or reads; SI values in, so a percentage is a fraction. The empty unit is a plain ratio. */
export const UNITS = {
  V: {
    name: "a voltage",
    example: "12 V or 350 mV",
    spellings: ["VDC", "volt", "volts"],
    prefixes: ["n", "µ", "m", "", "k"],
    bareFrom: -1,
  },
  A: {
    name: "a current",
    example: "2.5 mA or 800 µA",
    spellings: ["amp", "amps", "ampere", "amperes"],
    prefixes: ["p", "n", "µ", "m", ""],
  },
  W: {
    name: "a power",
    example: "250 mW or 1 W",
    spellings: ["watt", "watts"],
    prefixes: ["p", "n", "µ", "m", "", "k"],
  },
  Ω: {
    name: "a resistance",
    example: "4.7 kΩ, 4k7 or 470",
    spellings: ["ohm", "ohms", "R"],
    prefixes: ["m", "", "k", "M", "G", "T"],
    bareFrom: -1,
  },
  F: {
    name: "a capacitance",
    example: "100 nF, 4n7 or 10 uF",
    spellings: ["farad", "farads"],
    prefixes: ["p", "n", "µ", "m", ""],
  },
  Hz: {
    name: "a frequency",
    example: "20 Hz or 20 kHz",
    spellings: ["hertz"],
    prefixes: ["m", "", "k", "M", "G"],
    bareFrom: -1,
  },
  s: {
    name: "a time",
    example: "2 s or 150 ms",
    spellings: ["sec", "second", "seconds"],
    prefixes: ["n", "µ", "m", ""],
    caseMatters: true,
  },
  S: {
    name: "a conductance",
    example: "8 mS or 0.02 S",
    spellings: ["siemens"],
    prefixes: ["n", "µ", "m", ""],
    caseMatters: true,
  },
  "A/V²": {
    name: "a conduction parameter",
    example: "22 mA/V² or 0.15 A/V2",
    spellings: ["A/V^2"],
    prefixes: ["n", "µ", "m", ""],
  },
  "V/K": {
    name: "a temperature coefficient",
    example: "−2 mV/K",
    spellings: ["V/°C", "V/C"],
    prefixes: ["µ", "m", ""],
  },
  "1/V": {
    name: "a channel-length modulation",
    example: "0.02 1/V",
    spellings: ["/V", "V^-1", "V-1"],
    prefixes: [""],
  },
  "K/W": {
    name: "a thermal resistance",
    example: "350 K/W",
    spellings: ["°C/W", "C/W"],
    prefixes: [""],
  },
  "ppm/K": {
    name: "a temperature coefficient in parts per million",
    example: "50 ppm/K",
    spellings: ["ppm/°C", "ppm/C", "ppm"],
    prefixes: [""],
  },
  // One digit means whole degrees, since digits before the point always stay: no thermal figure here knows tenths.
  "°C": {
    name: "a temperature in °C",
    example: "25 °C or −10",
    spellings: ["°", "C", "oC", "degC", "deg", "celsius"],
    prefixes: [""],
    digits: 1,
  },
  "%": {
    name: "a percentage",
    example: "5 % or 0.5",
    spellings: ["percent"],
    prefixes: [""],
    power: -2,
  },
  "": { name: "a plain number", example: "10 or 2.5", spellings: [], prefixes: [""] },
} as const satisfies Record<string, UnitSpec>;
export type Unit = keyof typeof UNITS;
