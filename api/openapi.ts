import { extendZodWithOpenApi, OpenAPIRegistry, OpenApiGeneratorV31 } from "@asteasolutions/zod-to-openapi";
import { Router } from "express";
import swaggerUi from "swagger-ui-express";
import { z } from "zod";
import { problemSchema } from "#shared/schemas/problem";
import type { Route } from "./http/route";

extendZodWithOpenApi(z);

const COOKIE_SCHEME = "session";

/** Builds the OpenAPI 3.1 document from the routes' own schemas. */
export function describeApi(routes: readonly Route[], basePath: string) {
  const registry = new OpenAPIRegistry();
  registry.registerComponent("securitySchemes", COOKIE_SCHEME, {
    type: "apiKey",
    in: "cookie",
    name: "evenswing",
  });
  const problem = { "application/problem+json": { schema: problemSchema } };
  for (const route of routes) {
    const open = route.access === "public";
    registry.registerPath({
      method: route.method,
      path: route.path.replace(/:(\w+)/g, "{$1}"),
      summary: route.summary,
      tags: [route.tag],
      description: describeAccess(route),
      security: open ? [] : [{ [COOKIE_SCHEME]: [] }],
      request: {
        ...(route.params ? { params: route.params as z.ZodObject } : {}),
        ...(route.query ? { query: route.query as z.ZodObject } : {}),
        ...(route.body ? { body: { content: { "application/json": { schema: route.body } } } } : {}),
      },
      responses: {
        ...(route.response
          ? {
              [route.status ?? 200]: {
                description: "Done",
                content: { "application/json": { schema: route.response } },
              },
            }
          : { 204: { description: "Done" } }),
        ...(open ? {} : { 401: { description: "Nobody is signed in", content: problem } }),
        ...(open || route.access === "signed-in"
          ? {}
          : { 403: { description: "The role doesn't allow it", content: problem } }),
        ...(route.params ? { 404: { description: "There is none for this team", content: problem } } : {}),
        ...(route.body || route.query
          ? { 422: { description: "A field isn't right; each is named", content: problem } }
          : {}),
      },
    });
  }
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: "3.1.0",
    info: {
      title: "Evenswing",
      version: "1",
      description:
        "Quantities are in SI units, tolerances and shares are fractions, money is integer US cents, times are UTC. P-channel stages are given and answered as magnitudes. Errors are RFC 9457 problem details.",
    },
    servers: [{ url: basePath }],
  });
}

function describeAccess({ access }: Route): string {
  if (access === "public") return "Open to everyone.";
  return access === "signed-in" ? "For anyone signed in." : `Needs \`${access}\`.`;
}

/** Serves the document, and a page to read it on from local assets. */
export function serveDocumentation(routes: readonly Route[], basePath: string): Router {
  const document = describeApi(routes, basePath);
  const router = Router();
  router.get("/openapi.json", (_request, response) => {
    response.json(document);
  });
  const options = {
    customSiteTitle: "Evenswing API",
    swaggerOptions: { validatorUrl: null, defaultModelsExpandDepth: -1, docExpansion: "list" },
  };
  // The page's own styles only undo browser defaults and hide a sprite, and the content policy refuses them.
  const page = swaggerUi
    .generateHTML(document, options)
    .replace(/<style>[\s\S]*?<\/style>/g, "")
    .replace(/ style="[^"]*"/g, ' width="0" height="0"');
  // The page's assets are relative to it: this also sends /docs on to /docs/.
  router.use("/docs", swaggerUi.serveFiles(document, options));
  router.get("/docs", (_request, response) => {
    response.type("html").send(page);
  });
  return router;
}
