import { and, gt, lte, max } from "drizzle-orm";
import type { Queryable } from "../../db/client";
import { resistorOrderables } from "../../db/schema/orderables";

/** A tolerance that was written as a decimal and one that was computed may differ in the last bit. */
const TOLERANCE_SLACK = 1e-9;

const within = (tolerance: number) => lte(resistorOrderables.tolerance, tolerance + TOLERANCE_SLACK);

/** The power rating of the largest resistor at a tolerance or better, W; null where none is that good. */
export async function selectLargestRating(db: Queryable, tolerance: number): Promise<number | null> {
  const [found] = await db
    .select({ rating: max(resistorOrderables.powerRating) })
    .from(resistorOrderables)
    .where(within(tolerance));
  return found?.rating ?? null;
}

/** Resistances of which something is in stock at a tolerance or better, ohms. */
export async function selectStockedResistances(db: Queryable, tolerance: number): Promise<number[]> {
  const found = await db
    .selectDistinct({ ohms: resistorOrderables.ohms })
    .from(resistorOrderables)
    .where(and(within(tolerance), gt(resistorOrderables.stock, 0)));
  return found.map(({ ohms }) => ohms);
}
