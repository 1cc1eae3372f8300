import type { z } from "zod";
import { type Problem, problemSchema } from "#shared/schemas/problem";

const BASE_PATH = "/api/v1";

/** An answer that is a problem, or no answer at all. */
export class ProblemError extends Error {
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.detail ?? problem.title);
    this.problem = problem;
  }
}

const UNREACHABLE: Problem = {
  type: "about:blank",
  title: "The server can't be reached",
  status: 0,
  code: "unreachable",
  detail: "Check the connection and try again; nothing was lost.",
  errors: [],
};

type RequestOptions<S extends z.ZodType | null> = {
  method?: "GET" | "POST" | "PUT" | "DELETE";
  body?: unknown;
  /** The answer's schema; null for an answer without a body. */
  schema: S;
  signal?: AbortSignal;
};

/**
 * Calls the API.
 *
 * @param path below the base path
 * @throws ProblemError for every refusal and for no answer; the signal's reason when called off
 */
export async function callApi<S extends z.ZodType | null>(
  path: string,
  { method = "GET", body, schema, signal }: RequestOptions<S>,
): Promise<S extends z.ZodType ? z.infer<S> : null> {
  const response = await send(path, { method, body, signal, accept: "application/json" });
  const answer = schema === null ? null : schema.parse(await response.json());
  return answer as S extends z.ZodType ? z.infer<S> : null;
}

/** Calls the API for an answer that comes line by line, each a JSON value. */
export async function* streamApi<S extends z.ZodType>(
  path: string,
  { body, schema, signal }: { body: unknown; schema: S; signal: AbortSignal },
): AsyncGenerator<z.infer<S>> {
  const response = await send(path, { method: "POST", body, signal, accept: "application/x-ndjson" });
  if (!response.body) return;
  const reader = response.body.pipeThrough(new TextDecoderStream()).getReader();
  let pending = "";
  for (;;) {
    const { done, value } = await reader.read();
    pending += value ?? "";
    const lines = pending.split("\n");
    pending = lines.pop() ?? "";
    for (const line of lines) if (line) yield schema.parse(JSON.parse(line));
    if (done) return;
  }
}

async function send(
  path: string,
  { method, body, signal, accept }: { method: string; body: unknown; signal?: AbortSignal; accept: string },
): Promise<Response> {
  let response: Response;
  try {
    response = await fetch(BASE_PATH + path, {
      method,
      signal,
      headers: { accept, ...(body === undefined ? {} : { "content-type": "application/json" }) },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new ProblemError(UNREACHABLE);
  }
  if (response.ok) return response;
  throw new ProblemError(await readProblem(response));
}

async function readProblem(response: Response): Promise<Problem> {
  const parsed = problemSchema.safeParse(await response.json().catch(() => null));
  if (parsed.success) return parsed.data;
  return { ...UNREACHABLE, title: "The answer can't be read", status: response.status, code: "unreadable" };
}

/** The problem that an error is about, for showing; whatever else went wrong is told generically. */
export function problemOf(error: unknown): Problem {
  if (error instanceof ProblemError) return error.problem;
  return {
    ...UNREACHABLE,
    title: "Something went wrong",
    code: "unforeseen",
    detail: "Reload the page. If it stays, tell us what you did.",
  };
}
