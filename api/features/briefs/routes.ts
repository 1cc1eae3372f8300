import {
  briefListSchema,
  createBriefSchema,
  savedBriefSchema,
  updateBriefSchema,
} from "#shared/schemas/brief";
import { idParams } from "../../http/params";
import { route } from "../../http/route";
import { createBrief, deleteBrief, getBrief, listBriefs, restoreBrief, saveBrief } from "./service";

export const briefRoutes = [
  route({
    method: "get",
    path: "/briefs",
    access: "design:read",
    tag: "Briefs",
    summary: "List the team's saved briefs, the latest change first",
    response: briefListSchema,
    handle: (context) => listBriefs(context),
  }),
  route({
    method: "post",
    path: "/briefs",
    access: "design:write",
    tag: "Briefs",
    summary: "Save a new brief",
    body: createBriefSchema,
    response: savedBriefSchema,
    status: 201,
    handle: (context, { body }) => createBrief(context, body),
  }),
  route({
    method: "get",
    path: "/briefs/:id",
    access: "design:read",
    tag: "Briefs",
    summary: "Read one brief",
    params: idParams,
    response: savedBriefSchema,
    handle: (context, { params }) => getBrief(context, params.id),
  }),
  route({
    method: "put",
    path: "/briefs/:id",
    access: "design:write",
    tag: "Briefs",
    summary: "Save the next version of a brief",
    params: idParams,
    body: updateBriefSchema,
    response: savedBriefSchema,
    handle: (context, { params, body }) => saveBrief(context, params.id, body),
  }),
  route({
    method: "delete",
    path: "/briefs/:id",
    access: "design:write",
    tag: "Briefs",
    summary: "Delete a brief; it can be restored",
    params: idParams,
    handle: (context, { params }) => deleteBrief(context, params.id),
  }),
  route({
    method: "post",
    path: "/briefs/:id/restore",
    access: "design:write",
    tag: "Briefs",
    summary: "Bring a deleted brief back",
    params: idParams,
    response: savedBriefSchema,
    handle: (context, { params }) => restoreBrief(context, params.id),
  }),
];
