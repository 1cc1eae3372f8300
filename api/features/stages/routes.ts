import { keepStageSchema, stageListSchema, stageSchema, updateStageSchema } from "#shared/schemas/stage";
import { idParams } from "../../http/params";
import { route } from "../../http/route";
import { deleteStage, getStage, keepStage, listStages, restoreStage, saveStage } from "./service";

export const stageRoutes = [
  route({
    method: "get",
    path: "/stages",
    access: "design:read",
    tag: "Stages",
    summary: "List the team's kept stages, the latest change first",
    response: stageListSchema,
    handle: (context) => listStages(context),
  }),
  route({
    method: "post",
    path: "/stages",
    access: "design:write",
    tag: "Stages",
    summary: "Keep a fit as a stage",
    body: keepStageSchema,
    response: stageSchema,
    status: 201,
    handle: (context, { body }) => keepStage(context, body),
  }),
  route({
    method: "get",
    path: "/stages/:id",
    access: "design:read",
    tag: "Stages",
    summary: "Read one stage",
    params: idParams,
    response: stageSchema,
    handle: (context, { params }) => getStage(context, params.id),
  }),
  route({
    method: "put",
    path: "/stages/:id",
    access: "design:write",
    tag: "Stages",
    summary: "Rename a stage, note something on it or change its values",
    params: idParams,
    body: updateStageSchema,
    response: stageSchema,
    handle: (context, { params, body }) => saveStage(context, params.id, body),
  }),
  route({
    method: "delete",
    path: "/stages/:id",
    access: "design:write",
    tag: "Stages",
    summary: "Delete a stage; it can be restored",
    params: idParams,
    handle: (context, { params }) => deleteStage(context, params.id),
  }),
  route({
    method: "post",
    path: "/stages/:id/restore",
    access: "design:write",
    tag: "Stages",
    summary: "Bring a deleted stage back",
    params: idParams,
    response: stageSchema,
    handle: (context, { params }) => restoreStage(context, params.id),
  }),
];
