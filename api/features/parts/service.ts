import type { ListPartsQuery, Part, PartPage } from "#shared/schemas/part";
import type { SignedInContext } from "../../http/context";
import { invalid, notFound } from "../../http/problem";
import { readKept } from "../catalog/service";
import { type PartCursor, selectOwnParts, selectPart, selectParts, selectSharedParts } from "./queries";

/** One page of the catalog in part-number order. */
export async function listParts({ db, actor }: SignedInContext, query: ListPartsQuery): Promise<PartPage> {
  const after = query.cursor === undefined ? null : readCursor(query.cursor);
  const found = await selectParts(db, actor.team.id, query, after);
  const items = found.slice(0, query.limit);
  const last = items[items.length - 1];
  return { items, nextCursor: found.length > query.limit && last ? writeCursor(last) : null };
}

export async function getPart({ db, actor }: SignedInContext, id: number): Promise<Part> {
  const part = await selectPart(db, actor.team.id, id);
  if (!part) throw notFound("This part");
  return part;
}

/** Every part the team may use. */
export async function usableParts(context: SignedInContext): Promise<Part[]> {
  const { db, actor } = context;
  const found = await Promise.all([
    readKept(context, "shared", "parts", () => selectSharedParts(db)),
    readKept(context, "own", "parts", () => selectOwnParts(db, actor.team.id)),
  ]);
  return found.flat();
}

/** A cursor says where the last page ended; opaque to callers. */
function writeCursor({ partNumber, id }: Part): string {
  return Buffer.from(JSON.stringify([partNumber, id])).toString("base64url");
}

function readCursor(cursor: string): PartCursor {
  try {
    const [partNumber, id] = JSON.parse(Buffer.from(cursor, "base64url").toString("utf8"));
    if (typeof partNumber === "string" && Number.isInteger(id)) return { partNumber, id };
  } catch {
    // Told below, like a cursor that parses but holds something else.
  }
  throw invalid([{ path: "cursor", message: "Take the cursor from the last page's nextCursor" }]);
}
