import { z } from 'zod';

/** RFC 9457 problem details: what every refused request answers. `code` is a key of ERROR_STATUS. */
export const ProblemSchema = z.object({
  type: z.string(), // "about:blank" or /help/errors#code
  title: z.string(),
  status: z.int(),
  code: z.string(),
  detail: z.string(), // in words: what happened, where, what to do
  requestId: z.string(),
  issues: z.array(z.object({ path: z.string(), message: z.string() })).optional(), // field by field
  extra: z.record(z.string(), z.unknown()).optional(), // AppError.detail: both versions of a conflict, an InputError
});
export type Problem = z.infer<typeof ProblemSchema>;
