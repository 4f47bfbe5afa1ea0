import { useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type CreateProject,
  type Project,
  ProjectSchema,
  type UpdateProject,
} from '../../../shared/contracts/project.js';
import { api } from '../../lib/api.js';
import { mergeEdit } from '../../lib/project-store/merge-edit.js';

export function useCreateProject(teamId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: CreateProject) => api.post(`/teams/${teamId}/projects`, input, ProjectSchema),
    onSuccess: () => client.invalidateQueries({ queryKey: ['projects'] }),
  });
}

export function useUpdateProject() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ seen, change }: { seen: Project; change: UpdateProject }) =>
      mergeEdit(
        seen,
        change,
        (version, edited) => api.patch(`/projects/${seen.id}`, edited, ProjectSchema, { version }),
        () => api.get(`/projects/${seen.id}`, ProjectSchema),
      ),
    onSettled: () => client.invalidateQueries({ queryKey: ['projects'] }),
  });
}

export function useDeleteProject() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (seen: Project) => api.delete(`/projects/${seen.id}`, { version: seen.version }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['projects'] }),
  });
}
export function useRestoreProject() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api.post(`/projects/${id}/restore`, {}, ProjectSchema),
    onSuccess: () => client.invalidateQueries({ queryKey: ['projects'] }),
  });
}
