import type { Brief } from "#shared/schemas/brief";
import type { Relaxation } from "#shared/schemas/fits";

/** A brief with one condition relaxed as the ranking advised. */
export function relaxBrief(brief: Brief, { path, needed }: Relaxation): Brief {
  if (path === "polarity") return { ...brief, polarity: "either" };
  if (path === "parts") {
    const { stockedOnly, maxUnitPrice } = brief.parts;
    return { ...brief, parts: { stockedOnly, maxUnitPrice } };
  }
  if (path === "parts.stockedOnly") return { ...brief, parts: { ...brief.parts, stockedOnly: false } };
  if (path === "parts.maxUnitPrice") return { ...brief, parts: { ...brief.parts, maxUnitPrice: undefined } };
  const [group, field] = path.split(".") as [keyof Brief, string];
  return { ...brief, [group]: { ...(brief[group] as object), [field]: needed } };
}
