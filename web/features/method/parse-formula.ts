/** One piece of a formula as it is set in type. */
export type FormulaPart =
  | { kind: "symbol" | "text" | "sub" | "sup"; text: string }
  | { kind: "root"; of: FormulaPart[] }
  | { kind: "fraction"; over: FormulaPart[]; under: FormulaPart[] };

/** A lone letter is a symbol; letters in a row are a word (sin, min). */
const PATTERN = /_\{([^{}]*)\}|_(\w)|\^\{([^{}]*)\}|\^(.)|(\p{L}{2,})|(\p{L})|([^\p{L}_^{}√]+)/uy;

/**
 * Reads the notation that the method page writes formulas in: `I_D`, `V_{GS}`, `x^2`, `x^{−1.5}`, `√{a + b}` and
 * `{a}/{b}` for a stacked fraction.
 *
 * @throws SyntaxError where braces don't match
 */
export function parseFormula(source: string): FormulaPart[] {
  const parts: FormulaPart[] = [];
  let at = 0;
  while (at < source.length) {
    if (source[at] === "√" && source[at + 1] === "{") {
      const end = closingBrace(source, at + 1);
      parts.push({ kind: "root", of: parseFormula(source.slice(at + 2, end)) });
      at = end + 1;
    } else if (source[at] === "{") {
      const middle = closingBrace(source, at);
      if (source.slice(middle + 1, middle + 3) !== "/{") {
        throw new SyntaxError(`expected "/{" after the brace at ${middle} of "${source}"`);
      }
      const end = closingBrace(source, middle + 2);
      const over = parseFormula(source.slice(at + 1, middle));
      parts.push({ kind: "fraction", over, under: parseFormula(source.slice(middle + 3, end)) });
      at = end + 1;
    } else {
      PATTERN.lastIndex = at;
      const match = PATTERN.exec(source);
      if (!match) throw new SyntaxError(`can't read "${source}" from ${at}`);
      parts.push(simplePart(match));
      at = PATTERN.lastIndex;
    }
  }
  return parts;
}

function simplePart([text, ...groups]: RegExpExecArray): FormulaPart {
  const [longSub, shortSub, longSup, shortSup, word, symbol] = groups;
  const sub = longSub ?? shortSub;
  const sup = longSup ?? shortSup;
  if (sub !== undefined) return { kind: "sub", text: sub };
  if (sup !== undefined) return { kind: "sup", text: sup };
  if (symbol !== undefined) return { kind: "symbol", text: symbol };
  return { kind: "text", text: word ?? text };
}

function closingBrace(source: string, open: number): number {
  let depth = 0;
  for (let at = open; at < source.length; at++) {
    if (source[at] === "{") depth++;
    if (source[at] === "}" && --depth === 0) return at;
  }
  throw new SyntaxError(`the brace at ${open} of "${source}" is never closed`);
}

/** A formula as one would say it, for a screen reader. */
export function formulaInWords(parts: readonly FormulaPart[]): string {
  return parts.map(sayPart).join("").replace(/\s+/g, " ").trim();
}

function sayPart(part: FormulaPart): string {
  switch (part.kind) {
    case "symbol":
    case "text":
      return part.text;
    case "sub":
      return ` ${part.text} `;
    case "sup":
      return part.text === "2" ? " squared " : ` to the power ${part.text} `;
    case "root":
      return ` square root of (${formulaInWords(part.of)})`;
    case "fraction":
      return ` (${formulaInWords(part.over)}) over (${formulaInWords(part.under)}) `;
  }
}
