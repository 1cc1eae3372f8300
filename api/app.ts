import { randomUUID } from "node:crypto";
import { existsSync } from "node:fs";
import { join, resolve } from "node:path";
import express, { type Express } from "express";
import { rateLimit } from "express-rate-limit";
import helmet from "helmet";
import { pinoHttp } from "pino-http";
import { biasRoutes } from "./features/bias/routes";
import { briefRoutes } from "./features/briefs/routes";
import { fitRoutes } from "./features/fits/routes";
import { identityRoutes } from "./features/identity/routes";
import { partRoutes } from "./features/parts/routes";
import { stageRoutes } from "./features/stages/routes";
import { yieldRoutes } from "./features/yields/routes";
import type { Surroundings } from "./http/context";
import { answerProblems, mountRoutes, refuseUnknownRoute } from "./http/mount";
import { refuseForeignOrigin } from "./http/origin";
import { tooMany } from "./http/problem";
import type { Route } from "./http/route";
import { serveDocumentation } from "./openapi";

export const BASE_PATH = "/api/v1";

/** Every route of the API, in the order of the documentation. */
export const routes: readonly Route[] = [
  ...identityRoutes,
  ...partRoutes,
  ...biasRoutes,
  ...fitRoutes,
  ...briefRoutes,
  ...stageRoutes,
  ...yieldRoutes,
];

const MOST_REQUESTS_A_MINUTE = 1200;
const ONE_MINUTE_MS = 60_000;
const BODY_LIMIT = "256kb";

/**
 * Wires the server together.
 *
 * @param webFolder where the built pages are; left out, only the API is served
 */
export function createApp(surroundings: Surroundings, webFolder?: string): Express {
  const { environment, log } = surroundings;
  const app = express();
  app.disable("x-powered-by");
  app.get("/healthz", (_request, response) => {
    response.json({ status: "ok" });
  });
  app.use(
    pinoHttp({
      logger: log,
      genReqId: () => randomUUID(),
      // Headers hold cookies and addresses hold briefs: neither belongs in a log.
      serializers: {
        req: ({ id, method, url }: { id: string; method: string; url: string }) => ({
          id,
          method,
          path: url.split("?")[0],
        }),
        res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
      },
    }),
  );
  app.use(
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'"],
          styleSrc: ["'self'"],
          imgSrc: ["'self'", "data:"],
          objectSrc: ["'none'"],
          baseUri: ["'none'"],
          formAction: ["'self'"],
          frameAncestors: ["'none'"],
        },
      },
      referrerPolicy: { policy: "same-origin" },
      strictTransportSecurity: environment.publicOrigin?.startsWith("https://") ?? false,
    }),
  );
  app.use(
    BASE_PATH,
    rateLimit({
      windowMs: ONE_MINUTE_MS,
      limit: MOST_REQUESTS_A_MINUTE,
      standardHeaders: "draft-8",
      legacyHeaders: false,
      handler: (_request, _response, next) => next(tooMany("Slow down a little and try again.", 60)),
    }),
    refuseForeignOrigin(environment.publicOrigin),
    express.json({ limit: BODY_LIMIT, strict: true }),
    serveDocumentation(routes, BASE_PATH),
    mountRoutes(routes, surroundings),
    refuseUnknownRoute,
  );
  if (webFolder) servePages(app, webFolder);
  app.use(answerProblems(log));
  return app;
}

/** The built pages: hashed files for a year, the page itself fresh every time, for whatever address it routes. */
function servePages(app: Express, folder: string): void {
  const page = resolve(folder, "index.html");
  if (!existsSync(page)) throw new Error(`There is no built page at ${page}. Build it first.`);
  app.use(
    "/assets",
    express.static(join(folder, "assets"), { immutable: true, maxAge: "1y", fallthrough: false }),
  );
  app.use(express.static(folder, { index: false, maxAge: 0 }));
  app.get("/{*any}", (_request, response) => {
    response.set("cache-control", "no-cache").sendFile(page);
  });
}
