import { z } from 'zod';
import { FindingSchema } from '../output.js';
import { pageOf, rowShape } from './paging.js';
import { ReadingOverridesSchema, ReadingSchema } from './reading.js';

/** How the thing was held: the roles of the calculators that a single sweep can play. */
export const SWEEP_ROLES = [
  'sweep',
  'free-air',
  'added-mass',
  'known-volume',
  'box',
  'part',
  'earlier',
  'member',
] as const;
export const SweepRoleSchema = z.enum(SWEEP_ROLES);
export type SweepRole = z.infer<typeof SweepRoleSchema>;

/** What is known of the conditions; only what was told. */
export const SweepConditionsSchema = z.strictObject({
  role: SweepRoleSchema.default('sweep'),
  addedMassKg: z.number().positive().max(10).optional(), // with role added-mass
  testVolumeM3: z.number().positive().max(100).optional(), // with role known-volume
  radiatorMassKg: z.number().nonnegative().max(10).optional(), // with role box
  levelV: z.number().positive().max(1000).optional(),
  temperatureK: z.number().min(200).max(400).optional(),
  jigItemId: z.uuid().optional(),
});
export type SweepConditions = z.infer<typeof SweepConditionsSchema>;

const sweepShape = {
  name: z.string().trim().min(1).max(120),
  conditions: SweepConditionsSchema.default({ role: 'sweep' }),
  itemId: z.uuid().nullable().default(null),
  group: z.string().trim().max(80).default(''),
  tags: z.array(z.string().trim().min(1).max(40)).max(20).default([]),
};

/**
 * The fields beside the file of `POST /api/projects/:projectId/sources` (multipart: `file`, then `sweep` as JSON).
 * The server reads the file again with these overrides and never trusts points from outside.
 */
export const CreateSweepSchema = z.strictObject({
  ...sweepShape,
  batchId: z.uuid(), // one drop of files is one batch: undo removes it whole
  reading: ReadingOverridesSchema.default({}),
});
export type CreateSweep = z.infer<typeof CreateSweepSchema>;
export const UpdateSweepSchema = z.strictObject({
  name: sweepShape.name.optional(),
  conditions: SweepConditionsSchema.optional(),
  itemId: z.uuid().nullable().optional(),
  group: z.string().trim().max(80).optional(),
  tags: z.array(z.string().trim().min(1).max(40)).max(20).optional(),
});
export type UpdateSweep = z.infer<typeof UpdateSweepSchema>;

export const SourceFileSchema = z.object({
  id: z.uuid(),
  fileName: z.string(),
  bytes: z.int(),
  sha256: z.string().length(64), // of the file, byte for byte
});
export type SourceFile = z.infer<typeof SourceFileSchema>;

/** One reading of a source file; a new reading is a new revision, the older ones stay. */
export const SweepRevisionSchema = z.object({
  id: z.uuid(),
  sweepId: z.uuid(),
  number: z.int().positive(),
  reading: ReadingSchema,
  findings: z.array(FindingSchema),
  hasPhase: z.boolean(),
  points: z.int().min(8).max(20_000),
  minFrequencyHz: z.number().positive(),
  maxFrequencyHz: z.number().positive(),
  pointsSha256: z.string().length(64), // of the canonical points: the sweep's identity in a result
  createdAt: z.iso.datetime(),
});
export type SweepRevision = z.infer<typeof SweepRevisionSchema>;

export const SweepSchema = z.object({
  ...rowShape,
  ...sweepShape,
  projectId: z.uuid(),
  batchId: z.uuid(),
  source: SourceFileSchema,
  revision: SweepRevisionSchema, // the newest
});
export type SweepRow = z.infer<typeof SweepSchema>;
export const SweepPageSchema = pageOf(SweepSchema);

export const SweepRevisionPageSchema = pageOf(SweepRevisionSchema);

/** What an accepted upload answers; a file that is in the project already answers 409 `already-here` with `extra`. */
export const UploadedSweepSchema = z.object({ sweep: SweepSchema });
export const AlreadyHereSchema = z.object({ sweepId: z.uuid(), name: z.string() });
/** Undo and restore of a batch: the sweeps that were put into the bin or taken out of it. */
export const BatchAnswerSchema = z.object({ batchId: z.uuid(), sweepIds: z.array(z.uuid()) });

export const RereadSchema = z.strictObject({ reading: ReadingOverridesSchema });
export const KnownSourcesSchema = z.strictObject({ sha256: z.array(z.string().length(64)).min(1).max(500) });
export const KnownSourcesAnswerSchema = z.object({
  known: z.array(z.object({ sha256: z.string(), sweepId: z.uuid(), name: z.string() })),
});
