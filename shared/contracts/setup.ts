import { z } from 'zod';
import { pageOf, rowShape } from './paging.js';

/** A shared configuration of a calculator; its versions are numbered and never change. */
export const SetupVersionSchema = z.object({
  id: z.uuid(),
  number: z.int().positive(),
  calculatorId: z.string(),
  calculatorVersion: z.int().positive(),
  settings: z.record(z.string(), z.unknown()),
  settingsVersion: z.int().positive(),
  note: z.string(),
  createdAt: z.iso.datetime(),
  createdBy: z.object({ id: z.uuid(), name: z.string() }),
});
export const PublishSetupSchema = z.strictObject({
  settings: z.record(z.string(), z.unknown()),
  note: z.string().trim().max(500).default(''),
});
export const CreateSetupSchema = PublishSetupSchema.extend({
  name: z.string().trim().min(1).max(80),
  calculatorId: z.string().max(80),
});
export type CreateSetup = z.infer<typeof CreateSetupSchema>;
export const UpdateSetupSchema = z.strictObject({ name: z.string().trim().min(1).max(80) });
export const SetupSchema = z.object({
  ...rowShape,
  teamId: z.uuid(),
  name: z.string(),
  calculatorId: z.string(),
  newest: SetupVersionSchema,
});
export type Setup = z.infer<typeof SetupSchema>;
export const SetupPageSchema = pageOf(SetupSchema);
export const SetupVersionPageSchema = pageOf(SetupVersionSchema);
