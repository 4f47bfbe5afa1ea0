import { z } from 'zod';
import { OutputSchema } from '../output.js';
import { PageQuerySchema, pageOf, rowShape } from './paging.js';

/**
 * What one run of a calculator produced. Its identity is everything that went in: anyone can run it again and must
 * get the same digits. `inputsSha256` is over the canonical JSON of calculator, version, settings, seed and inputs.
 */
export const ResultInputSchema = z.strictObject({
  role: z.string().max(40),
  sweepId: z.uuid(),
  revisionId: z.uuid(),
  pointsSha256: z.string().length(64),
  keys: z.record(z.string().max(40), z.union([z.number(), z.string()])),
  prepSteps: z.array(z.record(z.string(), z.unknown())).default([]),
});
export const CreateResultSchema = z.strictObject({
  name: z.string().trim().max(120).default(''),
  sheetId: z.uuid().nullable().default(null),
  itemId: z.uuid().nullable().default(null),
  calculatorId: z.string().max(80),
  calculatorVersion: z.int().positive(),
  settings: z.record(z.string(), z.unknown()),
  settingsVersion: z.int().positive(),
  setupVersionId: z.uuid().nullable().default(null),
  seed: z.int().default(1),
  inputs: z.array(ResultInputSchema).min(1).max(500),
  output: OutputSchema,
});
export type CreateResult = z.infer<typeof CreateResultSchema>;
/** What of its inputs has moved on since: empty while the result is current. */
export const OutOfDateReasonSchema = z.object({
  what: z.enum(['reading', 'calculator', 'setup', 'prep-steps', 'settings', 'sweep-deleted']),
  sweepId: z.uuid().optional(),
  from: z.string(),
  to: z.string(),
});
export type OutOfDateReason = z.infer<typeof OutOfDateReasonSchema>;
export const ResultSchema = z.object({
  ...rowShape,
  ...CreateResultSchema.shape,
  projectId: z.uuid(),
  inputsSha256: z.string().length(64),
  createdBy: z.object({ id: z.uuid(), name: z.string() }),
  outOfDate: z.array(OutOfDateReasonSchema),
});
export type Result = z.infer<typeof ResultSchema>;
export const ResultPageSchema = pageOf(ResultSchema);
export const ResultQuerySchema = PageQuerySchema.extend({
  sheetId: z.uuid().optional(),
  itemId: z.uuid().optional(),
  sweepId: z.uuid().optional(), // results that took this sweep in any role
});
export type ResultQuery = z.infer<typeof ResultQuerySchema>;
export const UpdateResultSchema = z.strictObject({ name: z.string().trim().max(120) });
