import { queryOptions } from '@tanstack/react-query';
import { ProjectPageSchema, ProjectSchema } from '../../shared/contracts/project.js';
import type { Team } from '../../shared/contracts/team.js';
import { type Action, mayDo } from '../../shared/permissions.js';
import { text } from '../../shared/text.js';
import { api } from './api.js';
import { allPages } from './project-store/server-store.js';

export const projectsQuery = (teamId: string) =>
  queryOptions({
    queryKey: ['projects', { teamId }],
    queryFn: async () => {
      const projects = await allPages(`/teams/${teamId}/projects`, ProjectPageSchema);
      return projects.sort((a, b) => b.updatedAt.localeCompare(a.updatedAt));
    },
  });

export const projectQuery = (projectId: string) =>
  queryOptions({
    queryKey: ['projects', projectId],
    queryFn: ({ signal }) => api.get(`/projects/${projectId}`, ProjectSchema, { signal }),
  });

/** Why this person cannot do it, in words; undefined where they can. Without a team of theirs they only look. */
export function reasonAgainst(action: Action, team: Team | undefined, isVerified: boolean): string | undefined {
  if (team === undefined) return action.endsWith(':read') ? undefined : text.common.lookOnly;
  if (!mayDo(team.role, action)) return text.common.roleCannot(text.common.roles[team.role]);
  return isVerified || action.endsWith(':read') ? undefined : text.common.notVerified;
}
