import type { Brief } from "#shared/schemas/brief";
import type { SignedInContext } from "../../http/context";
import type { ResistorSupply } from "../../ranking/problem";
import { selectLargestRating, selectStockedResistances } from "./queries";

/** The size that a resistor is taken to have where the catalog holds none at the tolerance asked for: a 0603, W. */
const SMALLEST_USUAL_RATING = 0.1;

/** What resistors a brief can count on: the rating of the largest size at its tolerance, and the values in stock. */
export async function resistorSupply({ db }: SignedInContext, { resistors }: Brief): Promise<ResistorSupply> {
  const rating = await selectLargestRating(db, resistors.tolerance);
  const stocked = resistors.stockedOnly ? await selectStockedResistances(db, resistors.tolerance) : null;
  return { rating: rating ?? SMALLEST_USUAL_RATING, stocked: stocked && new Set(stocked) };
}
