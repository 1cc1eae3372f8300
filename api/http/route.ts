import type { Request, Response } from "express";
import type { z } from "zod";
import type { Action } from "#shared/permissions";
import type { Context, SignedInContext } from "./context";

/** Who may call a route: anyone, anyone signed in, or whoever a role allows an action. */
export type Access = "public" | "signed-in" | Action;

type Parsed<S> = S extends z.ZodType ? z.infer<S> : undefined;

type Shapes = { params?: z.ZodType; query?: z.ZodType; body?: z.ZodType };

export type Exchange = { request: Request; response: Response };

/** A route as the server, the OpenAPI document and the tests see it. */
export type Route = Shapes & {
  method: "get" | "post" | "put" | "delete";
  /** Below the base path, with `:name` for parameters. */
  path: string;
  access: Access;
  summary: string;
  tag: string;
  /** The answer's schema; left out, the route answers 204. */
  response?: z.ZodType;
  status?: 200 | 201;
  handle: (context: never, input: never, exchange: Exchange) => unknown;
};

/**
 * Declares a route: what may come in, what goes out and who may call it, beside the one line that does the work. A
 * handler that has written the response itself returns nothing.
 */
export function route<
  const A extends Access,
  P extends z.ZodType | undefined = undefined,
  Q extends z.ZodType | undefined = undefined,
  B extends z.ZodType | undefined = undefined,
  R extends z.ZodType | undefined = undefined,
>(definition: {
  method: Route["method"];
  path: string;
  access: A;
  summary: string;
  tag: string;
  params?: P;
  query?: Q;
  body?: B;
  response?: R;
  status?: 200 | 201;
  handle: (
    context: A extends "public" ? Context : SignedInContext,
    input: { params: Parsed<P>; query: Parsed<Q>; body: Parsed<B> },
    exchange: Exchange,
  ) => Promise<Parsed<R> | undefined> | Parsed<R> | undefined;
}): Route {
  return definition as Route;
}
