import type { Brief } from "#shared/schemas/brief";
import type { SignedInContext } from "../../http/context";
import type { ResistorSize } from "../../ranking/cost";
import type { ResistorSupply } from "../../ranking/problem";
import { readKept } from "../catalog/service";
import { type ResistorRow, selectResistors } from "./queries";

/** The size that a resistor is taken to have where the catalog holds none at the tolerance asked for: a 0603, W. */
const SMALLEST_USUAL_RATING = 0.1;
/** A tolerance that was written as a decimal and one that was computed may differ in the last bit. */
const TOLERANCE_SLACK = 1e-9;

/** What resistors a brief can count on: the largest rating at its tolerance, the values in stock, and the prices. */
export function resistorSupply(context: SignedInContext, brief: Brief): Promise<ResistorSupply> {
  const { tolerance, stockedOnly } = brief.resistors;
  const kind = `resistors at ${tolerance}, ${stockedOnly ? "in stock" : "all"}, for ${brief.buildQuantity}`;
  return readKept(context, "shared", kind, () => readSupply(context, brief));
}

async function readSupply(context: SignedInContext, brief: Brief): Promise<ResistorSupply> {
  const { tolerance, stockedOnly } = brief.resistors;
  const all = await readKept(context, "shared", "resistors", () => selectResistors(context.db));
  const within = all.filter((row) => row.tolerance <= tolerance + TOLERANCE_SLACK);
  const inStock = within.filter(({ stock }) => stock > 0);
  return {
    rating: within.reduce((most, { powerRating }) => Math.max(most, powerRating), 0) || SMALLEST_USUAL_RATING,
    stocked: stockedOnly ? new Set(inStock.map(({ ohms }) => ohms)) : null,
    prices: pricesAt(stockedOnly ? inStock : within, brief.buildQuantity),
  };
}

/** The sizes of each value at a build quantity, the smallest first, each at its cheapest. */
function pricesAt(rows: readonly ResistorRow[], quantity: number): Map<number, ResistorSize[]> {
  const prices = new Map<number, ResistorSize[]>();
  for (const { ohms, powerRating: power, voltageRating: voltage, priceBreaks } of rows) {
    const reached = priceBreaks.filter((step) => step.quantity <= quantity);
    const step = reached[reached.length - 1] ?? priceBreaks[0];
    if (!step) continue;
    const size = { power, voltage, lineCents: Math.round((quantity * step.centsPerThousand) / 1000) };
    const sizes = prices.get(ohms);
    if (sizes) sizes.push(size);
    else prices.set(ohms, [size]);
  }
  // Of sizes that stand the same only the cheapest is ever wanted, so it comes first.
  for (const sizes of prices.values()) {
    sizes.sort((a, b) => a.power - b.power || a.voltage - b.voltage || a.lineCents - b.lineCents);
  }
  return prices;
}
