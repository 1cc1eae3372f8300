import { type ErrorRequestHandler, type Request, type Response, Router } from "express";
import { may } from "#shared/permissions";
import type { Context, Surroundings } from "./context";
import { forbidden, notFound, ProblemError, presentProblem, unauthorised } from "./problem";
import type { Route } from "./route";
import type { Actor } from "./session";
import { parse } from "./validate";

/** Turns declared routes into a router: identify, authorise, parse, handle, answer. */
export function mountRoutes(routes: readonly Route[], surroundings: Surroundings): Router {
  const router = Router();
  for (const route of routes) {
    router[route.method](route.path, async (request, response) => {
      const context: Context & { actor?: Actor } = {
        ...surroundings,
        requestId: String(request.id),
        address: request.ip ?? "",
      };
      if (route.access !== "public") {
        const found = await surroundings.sessions.identify(request.get("cookie") ?? "");
        if (!found) throw unauthorised("signed_out", "Your session has ended. Sign in to go on.");
        if (found.cookie) response.append("set-cookie", found.cookie);
        if (route.access !== "signed-in" && !may(found.actor.roles, route.access)) {
          surroundings.log.warn({ user: found.actor.user.id, action: route.access }, "refused by role");
          throw forbidden("role", "Your role in this team doesn't allow this.");
        }
        context.actor = found.actor;
      }
      const input = {
        params: route.params && parse(route.params, request.params),
        query: route.query && parse(route.query, request.query),
        body: route.body && parse(route.body, request.body),
      };
      const answer = await route.handle(context as never, input as never, { request, response });
      if (response.headersSent) return;
      response.set("cache-control", "no-store");
      if (answer === undefined) response.status(204).end();
      else response.status(route.status ?? 200).json(answer);
    });
  }
  return router;
}

/** The end of the API's own paths: what no route took. */
export function refuseUnknownRoute(request: Request): never {
  throw notFound(`${request.method} ${request.baseUrl}${request.path}`);
}

/** Answers every error in the one shape; what nobody foresaw is logged and told generically. */
export function answerProblems(log: Surroundings["log"]): ErrorRequestHandler {
  return (error: unknown, request, response: Response, next) => {
    // Whoever closed the connection gets no answer, and calling off their work is no fault.
    if (response.destroyed) return;
    if (response.headersSent) return next(error);
    const problem = toProblem(error);
    if (problem.status === 500) log.error({ err: error, requestId: request.id }, "unforeseen error");
    if (problem.retryAfterSeconds !== null) response.set("retry-after", String(problem.retryAfterSeconds));
    response
      .status(problem.status)
      .type("application/problem+json")
      .set("cache-control", "no-store")
      .send(JSON.stringify(presentProblem(problem, String(request.id))));
  };
}

/** The body parser's errors carry a type, the router's and the file server's a status; the rest is unforeseen. */
function toProblem(error: unknown): ProblemError {
  if (error instanceof ProblemError) return error;
  const type = error instanceof Error && "type" in error ? error.type : null;
  const status = error instanceof Error && "status" in error ? Number(error.status) : 500;
  if (type === "entity.parse.failed") return new ProblemError(400, "bad_json", "The body is not valid JSON.");
  if (error instanceof URIError) return new ProblemError(400, "bad_path", "The address can't be read.");
  if (status === 413) return new ProblemError(413, "too_large", "The body is too large.");
  if (status === 415) return new ProblemError(415, "not_json", "Send JSON in UTF-8, plain or gzipped.");
  if (status === 404) return notFound("This file");
  if (status >= 400 && status < 500)
    return new ProblemError(400, "bad_request", "The request can't be read.");
  return new ProblemError(
    500,
    "unforeseen",
    "Something went wrong on our side. Try again; if it stays, tell us the request number.",
  );
}
