import { z } from "zod";

/** RFC 9457 problem details. */
export const Problem = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    code: z.string(),
    errors: z
      .array(
        z.object({
          path: z.string().optional(),
          line: z.number().optional(),
          column: z.string().optional(),
          message: z.string(),
        }),
      )
      .optional(),
  })
  .loose();
export type Problem = z.infer<typeof Problem>;
