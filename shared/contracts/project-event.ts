import { z } from 'zod';

/** What the project's event stream tells: rows by id and version; the client fetches them again. */
export const ProjectEventSchema = z.object({
  sequence: z.int(),
  entity: z.enum(['project', 'item', 'sweep', 'sheet', 'result', 'setup', 'limit-set', 'run']),
  entityId: z.uuid(),
  version: z.int(),
  change: z.enum(['made', 'changed', 'deleted', 'restored', 'progress']),
  actorId: z.uuid().nullable(),
});
export type ProjectEvent = z.infer<typeof ProjectEventSchema>;
