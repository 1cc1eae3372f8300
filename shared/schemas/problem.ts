import { z } from "zod";

/** The one error shape: RFC 9457 problem details, with a stable code and the fields that are wrong. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  code: z.string(),
  detail: z.string().optional(),
  requestId: z.string().optional(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })),
  /** With a refused stale edit: the record as it stands now. */
  current: z.unknown().optional(),
});

export type Problem = z.infer<typeof problemSchema>;
export type FieldError = Problem["errors"][number];
