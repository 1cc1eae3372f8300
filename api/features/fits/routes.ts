import { type FitsEvent, fitsRequestSchema, fitsResponseSchema } from "#shared/schemas/fits";
import { abortWhenClosed } from "../../http/abort-when-closed";
import { route } from "../../http/route";
import { findFits } from "./service";

const STREAM_TYPE = "application/x-ndjson";

export const fitRoutes = [
  route({
    method: "post",
    path: "/fits",
    access: "design:read",
    tag: "Fits",
    summary:
      "Rank every part × resistor combination of a brief. With Accept: application/x-ndjson the answer is a line of JSON for each step of progress, some with the first fits as they stand, then one with the result; closing the connection calls the search off",
    body: fitsRequestSchema,
    response: fitsResponseSchema,
    handle: async (context, { body }, { request, response }) => {
      const signal = abortWhenClosed(response);
      if (request.accepts(["application/json", STREAM_TYPE]) !== STREAM_TYPE) {
        return findFits(context, body, { signal });
      }
      // The status goes out with the first line, so that what can still be refused is refused properly.
      const send = (event: FitsEvent) => {
        if (!response.headersSent) {
          response.status(200).type(STREAM_TYPE).set("cache-control", "no-store");
          response.flushHeaders();
        }
        response.write(`${JSON.stringify(event)}\n`);
      };
      const result = await findFits(context, body, {
        signal,
        onProgress: (progress) => send({ progress }),
        onFits: (fits) => send({ fits }),
      });
      send({ result });
      response.end();
      return undefined;
    },
  }),
];
