import type { z } from "zod";
import type { FieldError } from "#shared/schemas/problem";
import { invalid } from "./problem";

type Issue = z.core.$ZodIssue;

/**
 * Parses what came in.
 *
 * @throws a 422 problem with every issue and its path, joined by dots
 */
export function parse<S extends z.ZodType>(schema: S, value: unknown): z.infer<S> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw invalid(parsed.error.issues.flatMap(fieldErrors));
}

function fieldErrors(issue: Issue): FieldError[] {
  const path = issue.path.map(String);
  if (issue.code === "unrecognized_keys") {
    return issue.keys.map((key) => ({ path: [...path, key].join("."), message: "There is no such field" }));
  }
  const message = issue.code === "invalid_type" && issue.input === undefined ? "Missing" : issue.message;
  return [{ path: path.join("."), message }];
}
