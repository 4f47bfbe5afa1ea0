import { z } from 'zod';
import { pageOf, rowShape } from './paging.js';

const projectShape = {
  name: z.string().trim().min(1).max(80),
  note: z.string().trim().max(2000).default(''),
};
export const CreateProjectSchema = z.strictObject(projectShape);
export type CreateProject = z.infer<typeof CreateProjectSchema>;
export const UpdateProjectSchema = z.strictObject({
  name: projectShape.name.optional(),
  note: z.string().trim().max(2000).optional(),
});
export type UpdateProject = z.infer<typeof UpdateProjectSchema>;
export const ProjectSchema = z.object({
  ...rowShape,
  ...projectShape,
  teamId: z.uuid(),
  isInvented: z.boolean(), // the demo: data made by the seed script
  counts: z.object({ sweeps: z.int(), sheets: z.int(), items: z.int(), results: z.int() }),
});
export type Project = z.infer<typeof ProjectSchema>;
export const ProjectPageSchema = pageOf(ProjectSchema);
