import { z } from 'zod';
import { pageOf } from './paging.js';

/** One change: who, what, from what to what. Each row's hash covers the one before, so tampering shows. */
export const ActivitySchema = z.object({
  sequence: z.int().positive(), // rising within the team
  at: z.iso.datetime(),
  actor: z.object({ id: z.uuid(), name: z.string() }).nullable(), // null: the product itself
  action: z.string(), // noun:verb, as in the permission table
  entity: z.string(),
  entityId: z.uuid(),
  projectId: z.uuid().nullable(),
  from: z.record(z.string(), z.unknown()).nullable(),
  to: z.record(z.string(), z.unknown()).nullable(),
  previousHash: z.string().length(64),
  hash: z.string().length(64),
});
export type Activity = z.infer<typeof ActivitySchema>;
export const ActivityPageSchema = pageOf(ActivitySchema);
