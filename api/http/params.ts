import { z } from "zod";

/** `:id` of a record. */
export const idParams = z.strictObject({
  id: z.coerce
    .number()
    .int()
    .positive("There is no such record")
    .max(4_294_967_295, "There is no such record"),
});
