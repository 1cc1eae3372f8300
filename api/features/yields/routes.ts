import {
  fitYieldsRequestSchema,
  fitYieldsResponseSchema,
  stageYieldRequestSchema,
  stageYieldResponseSchema,
} from "#shared/schemas/yield";
import { abortWhenClosed } from "../../http/abort-when-closed";
import { idParams } from "../../http/params";
import { route } from "../../http/route";
import { yieldOfFits, yieldOfStage } from "./service";

export const yieldRoutes = [
  route({
    method: "post",
    path: "/fits/yield",
    access: "design:read",
    tag: "Fits",
    summary:
      "Simulate builds of some fits: the share that meets the brief. Closing the connection calls it off",
    body: fitYieldsRequestSchema,
    response: fitYieldsResponseSchema,
    handle: (context, { body }, { response }) => yieldOfFits(context, body, abortWhenClosed(response)),
  }),
  route({
    method: "post",
    path: "/stages/:id/yield",
    access: "design:read",
    tag: "Stages",
    summary:
      "Simulate builds of a stage, as kept or with other values: the share that meets its brief, and the parameter that costs the most",
    params: idParams,
    body: stageYieldRequestSchema,
    response: stageYieldResponseSchema,
    handle: (context, { params, body }, { response }) =>
      yieldOfStage(context, params.id, body, abortWhenClosed(response)),
  }),
];
