import type { RequestHandler } from "express";
import { forbidden } from "./problem";

const SAFE_METHODS = ["GET", "HEAD", "OPTIONS"];

/**
 * Refuses requests that change something and come from another site's page. Browsers send Origin or Sec-Fetch-Site
 * with those; a caller that sends neither is no browser and carries no cookie by accident.
 *
 * @param publicOrigin the address people use; null takes the request's own host
 */
export function refuseForeignOrigin(publicOrigin: string | null): RequestHandler {
  return (request, _response, next) => {
    if (SAFE_METHODS.includes(request.method)) return next();
    const origin = request.get("origin");
    const site = request.get("sec-fetch-site");
    const own = publicOrigin ?? `${request.protocol}://${request.get("host")}`;
    const foreign =
      (origin !== undefined && origin !== own) ||
      (site !== undefined && site !== "same-origin" && site !== "none");
    next(foreign ? forbidden("foreign_origin", "This request came from another site.") : undefined);
  };
}
