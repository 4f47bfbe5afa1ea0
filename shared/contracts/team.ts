import { z } from 'zod';

export const ROLES = ['owner', 'lead', 'member', 'viewer'] as const;
export const RoleSchema = z.enum(ROLES);
export type Role = z.infer<typeof RoleSchema>;

/** A team as one of its people sees it: `role` is theirs. */
export const TeamSchema = z.object({ id: z.uuid(), name: z.string(), role: RoleSchema });
export type Team = z.infer<typeof TeamSchema>;
