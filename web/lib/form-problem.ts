import type { FieldPath, FieldValues, UseFormReturn } from "react-hook-form";
import type { Problem } from "#shared/schemas/problem";

/**
 * Puts a refusal's words at the fields it names.
 *
 * @param prefix of the server's paths that the form doesn't have, such as "brief."
 * @returns whether every error found a field; otherwise the rest is shown with the problem
 */
export function applyProblem<T extends FieldValues>(
  form: UseFormReturn<T>,
  problem: Problem,
  prefix = "",
): boolean {
  let placed = problem.errors.length > 0;
  for (const { path, message } of problem.errors) {
    const own = path.startsWith(prefix) ? path.slice(prefix.length) : null;
    if (own) form.setError(own as FieldPath<T>, { type: "server", message });
    else placed = false;
  }
  return placed;
}
