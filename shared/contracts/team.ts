import { z } from 'zod';
import { pageOf } from './paging.js';

export const ROLES = ['owner', 'lead', 'member', 'viewer'] as const;
export const RoleSchema = z.enum(ROLES);
export type Role = z.infer<typeof RoleSchema>;

/** A team as one of its people sees it: `role` is theirs. */
export const TeamSchema = z.object({ id: z.uuid(), name: z.string(), role: RoleSchema });
export type Team = z.infer<typeof TeamSchema>;

/** What lies in the bin, newest first: it can be restored until `purgedAt`. */
export const BIN_ENTITIES = ['project', 'item', 'sweep', 'sheet', 'result', 'setup', 'limit-set'] as const;
export const BinEntrySchema = z.object({
  entity: z.enum(BIN_ENTITIES),
  entityId: z.uuid(),
  name: z.string(),
  project: z.object({ id: z.uuid(), name: z.string() }).nullable(), // null: of the team itself
  deletedAt: z.iso.datetime(),
  deletedBy: z.object({ id: z.uuid(), name: z.string() }).nullable(),
  purgedAt: z.iso.datetime(), // from then on it is gone for good
});
export type BinEntry = z.infer<typeof BinEntrySchema>;
export const BinPageSchema = pageOf(BinEntrySchema);
