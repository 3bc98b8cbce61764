import * as z from 'zod/mini';

/** RFC 9457 problem details with the members that Ripplebench always adds. */
export const problemBody = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  code: z.string(),
  detail: z.string(),
  requestId: z.string(),
  errors: z.optional(z.array(z.object({ field: z.string(), message: z.string() }))),
});
export type ProblemBody = z.infer<typeof problemBody>;
