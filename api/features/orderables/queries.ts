import type { Queryable } from "../../db/client";
import { resistorOrderables } from "../../db/schema/orderables";

/** What the ranking has to know of a resistor that can be bought. */
export type ResistorRow = Awaited<ReturnType<typeof selectResistors>>[number];

/** Every resistor in the catalog. */
export function selectResistors(db: Queryable) {
  const { ohms, tolerance, powerRating, voltageRating, stock, priceBreaks } = resistorOrderables;
  return db
    .select({ ohms, tolerance, powerRating, voltageRating, stock, priceBreaks })
    .from(resistorOrderables);
}
