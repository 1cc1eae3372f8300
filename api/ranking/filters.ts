import type { Brief } from "#shared/schemas/brief";
import type { PassedOverReason } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";

/** What one piece costs at a quantity, integer cents: the deepest break reached; null without a price. */
export function unitPriceAt(part: Pick<Part, "priceBreaks">, quantity: number): number | null {
  const reached = part.priceBreaks.filter((step) => step.quantity <= quantity);
  const breaks = reached.length > 0 ? reached : part.priceBreaks.slice(0, 1);
  return breaks.length > 0 ? breaks[breaks.length - 1].unitPrice : null;
}

/** The filter of a brief that bars a part before any stage is solved; null when none does. */
export function barredBy(part: Part, brief: Brief): PassedOverReason | null {
  const { packages, mounting, makers, ids, stockedOnly, maxUnitPrice } = brief.parts;
  if (brief.polarity !== "either" && part.polarity !== brief.polarity) return "polarity";
  if (
    (packages && !packages.includes(part.package)) ||
    (mounting && part.mounting !== mounting) ||
    (makers && !makers.includes(part.maker)) ||
    (ids && !ids.includes(part.id))
  ) {
    return "part-filter";
  }
  if (stockedOnly && part.stock <= 0) return "stock";
  if (maxUnitPrice !== undefined) {
    const price = unitPriceAt(part, brief.buildQuantity);
    if (price === null || price > maxUnitPrice) return "unit-price";
  }
  return null;
}
