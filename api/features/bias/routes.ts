import { solveStage } from "#shared/bias/solve-stage";
import {
  biasSchema,
  solveRequestSchema,
  spreadRequestSchema,
  spreadResponseSchema,
} from "#shared/schemas/bias";
import { abortWhenClosed } from "../../http/abort-when-closed";
import { route } from "../../http/route";
import { analyseSpread } from "./service";

export const biasRoutes = [
  route({
    method: "post",
    path: "/bias/solve",
    access: "design:read",
    tag: "Bias",
    summary: "Solve the Q-point of one stage and what follows from it",
    body: solveRequestSchema,
    response: biasSchema,
    handle: (_context, { body }) => solveStage(body.device, body.stage, body.inputPeak),
  }),
  route({
    method: "post",
    path: "/bias/spread",
    access: "design:read",
    tag: "Bias",
    summary:
      "Find the swing that every build inside a spread has, the builds that set it, and the share of simulated builds that are saturated at their Q-point",
    body: spreadRequestSchema,
    response: spreadResponseSchema,
    handle: (_context, { body }, { response }) => analyseSpread(body, abortWhenClosed(response)),
  }),
];
