import { z } from 'zod';
import { pageOf, rowShape } from './paging.js';

/** Tolerances of the team: ranges of figures and bands of |Z|; versions are numbered and never change. */
export const FigureLimitSchema = z
  .strictObject({
    figureId: z.string().max(40),
    low: z.number().nullable(),
    high: z.number().nullable(),
    unit: z.string(),
  })
  .refine((l) => l.low !== null || l.high !== null, { error: 'A limit needs a low end, a high end, or both.' });
export const CurveLimitSchema = z.strictObject({
  frequencyHz: z.array(z.number().positive()).min(2).max(2000),
  lowOhm: z.array(z.number().positive()).nullable(),
  highOhm: z.array(z.number().positive()).nullable(),
});
export const LimitContentSchema = z.strictObject({
  figures: z.array(FigureLimitSchema).max(100).default([]),
  curves: z.array(CurveLimitSchema).max(10).default([]),
});
export const LimitVersionSchema = z.object({
  id: z.uuid(),
  number: z.int().positive(),
  content: LimitContentSchema,
  note: z.string(),
  createdAt: z.iso.datetime(),
  createdBy: z.object({ id: z.uuid(), name: z.string() }),
});
export const PublishLimitsSchema = z.strictObject({
  content: LimitContentSchema,
  note: z.string().trim().max(500).default(''),
});
export const CreateLimitSetSchema = PublishLimitsSchema.extend({ name: z.string().trim().min(1).max(80) });
export type CreateLimitSet = z.infer<typeof CreateLimitSetSchema>;
export const UpdateLimitSetSchema = z.strictObject({ name: z.string().trim().min(1).max(80) });
export const LimitSetSchema = z.object({ ...rowShape, teamId: z.uuid(), name: z.string(), newest: LimitVersionSchema });
export type LimitSet = z.infer<typeof LimitSetSchema>;
export const LimitSetPageSchema = pageOf(LimitSetSchema);
export const LimitVersionPageSchema = pageOf(LimitVersionSchema);
