import { solveStage } from "#shared/bias/solve-stage";
import { biasSchema, solveRequestSchema } from "#shared/schemas/bias";
import { route } from "../../http/route";

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
];
