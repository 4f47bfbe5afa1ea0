import { z } from 'zod';
import { pageOf, rowShape } from './paging.js';

/** A saved chart view: what is drawn, ranges, cursors, and the calculators' cards. */
export const CHART_VIEWS = ['magnitude-phase', 'real-imaginary', 'locus'] as const;
export const RangeSchema = z.tuple([z.number(), z.number()]);
export const DrawnSweepSchema = z.strictObject({
  sweepId: z.uuid(),
  lineNumber: z.int().min(1).max(8), // colour, dash and marker; kept while drawn
  isReference: z.boolean().default(false),
});
/** One calculator on the sheet: which sweep plays which role, with what is told beside it, and the settings. */
export const CardSchema = z.strictObject({
  id: z.uuid(),
  calculatorId: z.string().max(80),
  inputs: z.record(
    z.string().max(40),
    z.array(
      z.strictObject({ sweepId: z.uuid(), keys: z.record(z.string().max(40), z.union([z.number(), z.string()])) }),
    ),
  ),
  settings: z.record(z.string(), z.unknown()),
  setupVersionId: z.uuid().nullable().default(null),
  resultId: z.uuid().nullable().default(null), // the kept result, if any
});
export type Card = z.infer<typeof CardSchema>;
export const SheetContentSchema = z.strictObject({
  view: z.enum(CHART_VIEWS).default('magnitude-phase'),
  drawn: z.array(DrawnSweepSchema).max(200).default([]),
  frequencyRangeHz: RangeSchema.nullable().default(null), // null: all of it
  magnitudeRangeOhm: RangeSchema.nullable().default(null),
  phaseRangeDeg: RangeSchema.nullable().default(null),
  realRangeOhm: RangeSchema.nullable().default(null),
  imaginaryRangeOhm: RangeSchema.nullable().default(null),
  frequencyScale: z.enum(['log', 'linear']).default('log'),
  magnitudeScale: z.enum(['log', 'linear']).default('log'),
  isPhaseUnwrapped: z.boolean().default(false), // only when asked
  cursorAHz: z.number().positive().nullable().default(null),
  cursorBHz: z.number().positive().nullable().default(null),
  cards: z.array(CardSchema).max(40).default([]),
});
export type SheetContent = z.infer<typeof SheetContentSchema>;
export const CreateSheetSchema = z.strictObject({
  name: z.string().trim().min(1).max(120),
  content: SheetContentSchema.prefault({}),
});
export type CreateSheet = z.infer<typeof CreateSheetSchema>;
export const UpdateSheetSchema = z.strictObject({
  name: z.string().trim().min(1).max(120).optional(),
  content: SheetContentSchema.optional(),
});
export type UpdateSheet = z.infer<typeof UpdateSheetSchema>;
export const SheetSchema = z.object({
  ...rowShape,
  projectId: z.uuid(),
  name: z.string(),
  content: SheetContentSchema,
});
export type Sheet = z.infer<typeof SheetSchema>;
export const SheetPageSchema = pageOf(SheetSchema);
