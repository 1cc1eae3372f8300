import { PREFIXES, type Prefix, UNITS, type Unit, type UnitSpec } from "./units";

export type ParsedQuantity = { ok: true; value: number } | { ok: false; message: string };

/** The prefixes as people type them; text is compared after NFKC, which makes every µ U+03BC. */
const TYPED_PREFIXES = new Map<string, Prefix>([
  ["", ""],
  ["p", "p"],
  ["P", "p"],
  ["n", "n"],
  ["N", "n"],
  ["u", "µ"],
  ["U", "µ"],
  ["\u03bc", "µ"],
  ["m", "m"],
  ["k", "k"],
  ["K", "k"],
  ["M", "M"],
  ["meg", "M"],
  ["Meg", "M"],
  ["MEG", "M"],
  ["G", "G"],
  ["T", "T"],
]);

/** A sign, a number with a point or a comma, perhaps a power of ten, and what stands behind it. */
const NUMBER = /^([+-]?)(\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE]([+-]?\d+))?\s*(.*)$/;
/** A letter in the place of the point, as in 4k7, R47 and 3V3; e is left to powers of ten. */
const INFIX = /^([+-]?)(\d*)([A-DF-Za-df-z\u03bc])(\d+)(?!.*\d)\s*(.*)$/;
/** A comma that may be a decimal point or stand between thousands. */
const UNCLEAR_COMMA = /^[1-9]\d{0,2},\d{3}$/;
/** Nothing longer is a quantity; also keeps what is echoed short. */
const LONGEST = 40;

/**
 * Reads a quantity as people type it: "12", "12V", "1,5 V", "10k", "10 kohm", "4k7", "−10 °C", "100 uF". A bare number
 * is in the unit; for "%" it is per cent, so "5" and "5 %" are 0.05. A range is not checked here.
 *
 * @returns the value in SI, or a message that says what was read, what is expected and an example
 */
export function parseQuantity(text: string, unit: Unit): ParsedQuantity {
  const spec: UnitSpec = UNITS[unit];
  const typed = text.trim();
  if (typed === "") return fail(`Write ${spec.name}, such as ${spec.example}.`);
  if (typed.length > LONGEST) return fail(`“${typed.slice(0, LONGEST)}…” ${unreadable(spec)}`);
  const echo = `“${typed}”`;
  const plain = normalise(typed, unit);
  if (/\d[.,]\d*[.,]\d/.test(plain)) {
    return fail(`${echo} has more than one point or comma. Leave out thousands separators, as in 1234.5.`);
  }
  const parts = splitNumber(plain, unit);
  if (!parts) return fail(`${echo} ${unreadable(spec)}`);
  const { sign, number, power, suffix } = parts;
  if (UNCLEAR_COMMA.test(number)) {
    const [dotted, joined] = [number.replace(",", "."), number.replace(",", "")];
    return fail(`${echo} could be ${dotted} or ${joined}: write it without the comma.`);
  }
  const prefix = readSuffix(suffix, unit);
  if (prefix === undefined) return fail(`${echo} ${explainSuffix(sign + number, suffix, unit)}`);
  const scaled = Number(`${sign}${number.replace(",", ".")}e${power + PREFIXES[prefix] + (spec.power ?? 0)}`);
  if (!Number.isFinite(scaled)) {
    return fail(`${echo} is too large for ${spec.name}. Write, for example, ${spec.example}.`);
  }
  return { ok: true, value: scaled === 0 ? 0 : scaled };
}

function fail(message: string): ParsedQuantity {
  return { ok: false, message };
}

/** One spelling for each character, no spaces between thousands, and no ± where a tolerance is meant anyway. */
function normalise(typed: string, unit: Unit): string {
  const plain = typed
    .normalize("NFKC")
    .replace(/[\u2212\u2013]/g, "-")
    .replace(/\s+/g, " ")
    .replace(/(?<=\d) (?=\d{3}(?!\d))/g, "");
  return unit === "%" ? plain.replace(/^(±|\+\/-)\s*/, "") : plain.replace(/^([+-]) /, "$1");
}

type NumberParts = { sign: string; number: string; power: number; suffix: string };

function splitNumber(plain: string, unit: Unit): NumberParts | null {
  const infix = plain.match(INFIX);
  if (infix && (infix[2] !== "" || unit === "Ω" || unit === "F")) {
    const [, sign, whole, letter, fraction, rest] = infix;
    const isPoint = unit === "Ω" && /[Rr]/.test(letter);
    return {
      sign,
      number: `${whole || "0"}.${fraction}`,
      power: 0,
      suffix: closeUp(isPoint ? rest : letter + rest),
    };
  }
  const match = plain.match(NUMBER);
  if (!match) return null;
  const [, sign, number, power = "0", rest] = match;
  return { sign, number, power: Number(power), suffix: closeUp(rest) };
}

const closeUp = (text: string) => text.replace(/\s/g, "");

/** The prefix that a suffix gives in a unit; undefined where it is not one of that unit's. */
function readSuffix(suffix: string, unit: Unit): Prefix | undefined {
  const { prefixes }: UnitSpec = UNITS[unit];
  const typed = prefixBefore(suffix, unit) ?? suffix;
  const prefix = TYPED_PREFIXES.get(typed);
  if (prefix === undefined || !prefixes.includes(prefix)) return undefined;
  // Where milli and mega both occur, a small m counts only in the full symbol: "10m" is more often a slip for 10 M.
  if (prefix === "m" && prefixes.includes("M") && suffix !== `m${unit}`) return undefined;
  return prefix;
}

/** What stands before the unit in a suffix; undefined where the suffix doesn't end in the unit. */
function prefixBefore(suffix: string, unit: Unit): string | undefined {
  const { spellings, caseMatters }: UnitSpec = UNITS[unit];
  const fold = (word: string) => (caseMatters ? word : word.toLowerCase());
  const names = [unit.normalize("NFKC"), ...spellings].filter(
    (name) => name !== "" && fold(suffix).endsWith(fold(name)),
  );
  const longest = Math.max(...names.map((name) => name.length));
  return names.length === 0 ? undefined : suffix.slice(0, suffix.length - longest);
}

/** Says why a suffix is not one of the unit's, and what to write with the same number. */
function explainSuffix(number: string, suffix: string, unit: Unit): string {
  const spec: UnitSpec = UNITS[unit];
  const prefix = TYPED_PREFIXES.get(prefixBefore(suffix, unit) ?? suffix);
  if (prefix === "m" && spec.prefixes.includes("M")) {
    return `could be milli or mega. Write ${number} M${unit} or ${number} m${unit}.`;
  }
  if (prefix === "M" && spec.prefixes.includes("m")) {
    return `says mega: M is mega, m is milli, u is micro. Write ${number} m${unit} or ${number} ${unit}.`;
  }
  const other = (Object.keys(UNITS) as Unit[]).find(
    (each) => prefixBefore(suffix, each) !== undefined && readSuffix(suffix, each) !== undefined,
  );
  if (other)
    return `is ${UNITS[other].name}, and ${spec.name} is expected. Write, for example, ${spec.example}.`;
  return unreadable(spec);
}

const unreadable = ({ name, example }: UnitSpec) =>
  `can't be read as ${name}. Write, for example, ${example}.`;
