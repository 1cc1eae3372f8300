import { listPartsQuery, partPageSchema, partSchema } from "#shared/schemas/part";
import { idParams } from "../../http/params";
import { route } from "../../http/route";
import { getPart, listParts } from "./service";

export const partRoutes = [
  route({
    method: "get",
    path: "/parts",
    access: "design:read",
    tag: "Parts",
    summary: "List the catalog in part-number order",
    query: listPartsQuery,
    response: partPageSchema,
    handle: (context, { query }) => listParts(context, query),
  }),
  route({
    method: "get",
    path: "/parts/:id",
    access: "design:read",
    tag: "Parts",
    summary: "Read one part",
    params: idParams,
    response: partSchema,
    handle: (context, { params }) => getPart(context, params.id),
  }),
];
