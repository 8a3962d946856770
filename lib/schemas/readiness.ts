import { z } from "zod";

const Answer = z.enum(["answers", "silent"]);

export const Readiness = z.object({
  status: z.enum(["ready", "not-ready"]),
  database: Answer,
  queue: Answer,
  storage: Answer,
});
export type Readiness = z.infer<typeof Readiness>;
