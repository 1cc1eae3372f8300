import type { FieldError, Problem } from "#shared/schemas/problem";

/** What a service throws when it can't do as asked; the error handler turns it into problem+json. */
export class ProblemError extends Error {
  readonly status: number;
  readonly code: string;
  readonly errors: FieldError[];
  readonly current: unknown;
  readonly retryAfterSeconds: number | null;

  constructor(
    status: number,
    code: string,
    message: string,
    more: { errors?: FieldError[]; current?: unknown; retryAfterSeconds?: number } = {},
  ) {
    super(message);
    this.status = status;
    this.code = code;
    this.errors = more.errors ?? [];
    this.current = more.current;
    this.retryAfterSeconds = more.retryAfterSeconds ?? null;
  }
}

const TITLES: Record<number, string> = {
  400: "The request can't be read",
  401: "Sign in first",
  403: "Not allowed",
  404: "Not found",
  409: "Changed meanwhile",
  413: "Too large",
  415: "Not JSON",
  422: "Something isn't right",
  429: "Too many requests",
  500: "Something went wrong",
};

/** @param what the thing looked for, as the subject of a sentence: "This brief" */
export function notFound(what: string): ProblemError {
  return new ProblemError(404, "not_found", `${what} does not exist, or not for this team.`);
}

export function unauthorised(code: string, message: string): ProblemError {
  return new ProblemError(401, code, message);
}

export function forbidden(code: string, message: string): ProblemError {
  return new ProblemError(403, code, message);
}

/** A stale edit: names the fields that changed since, and hands over the record as it stands. */
export function conflict(
  code: string,
  message: string,
  errors: FieldError[],
  current: unknown,
): ProblemError {
  return new ProblemError(409, code, message, { errors, current });
}

export function invalid(errors: FieldError[]): ProblemError {
  return new ProblemError(422, "invalid", errors[0]?.message ?? "Check the fields.", { errors });
}

export function tooMany(message: string, retryAfterSeconds: number): ProblemError {
  return new ProblemError(429, "too_many_requests", message, { retryAfterSeconds });
}

/** The body of a problem answer (RFC 9457). */
export function presentProblem(error: ProblemError, requestId: string): Problem {
  return {
    type: "about:blank",
    title: TITLES[error.status] ?? "Something went wrong",
    status: error.status,
    code: error.code,
    detail: error.message,
    requestId,
    errors: error.errors,
    ...(error.current === undefined ? {} : { current: error.current }),
  };
}
