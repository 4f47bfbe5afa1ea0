import { useQuery } from '@tanstack/react-query';
import { type ReactNode, useMemo } from 'react';
import { useParams } from 'react-router-dom';
import type { Me } from '../../shared/contracts/account.js';
import type { Project } from '../../shared/contracts/project.js';
import type { Team } from '../../shared/contracts/team.js';
import { text } from '../../shared/text.js';
import { meQuery } from '../lib/me.js';
import { serverStore } from '../lib/project-store/server-store.js';
import { ProjectStoreProvider } from '../lib/project-store/store-context.js';
import { projectQuery, reasonAgainst } from '../lib/projects.js';
import { ButtonLink } from './button.js';
import { ErrorBar } from './error-bar.js';
import { Loading } from './loading.js';
import { PageFrame } from './page-frame.js';

export interface Scope {
  project: Project;
  me: Me;
  team: Team | undefined;
}

/** The project named in the address, with its store, for everything below; its loading and its absence as pages. */
export function ProjectScope({ children }: { children: (scope: Scope) => ReactNode }) {
  const { project: projectId = '' } = useParams();
  const me = useQuery(meQuery);
  const project = useQuery(projectQuery(projectId));
  const team = me.data?.teams.find(({ id }) => id === project.data?.teamId);
  const reason = me.data && project.data && reasonAgainst('sweep:create', team, me.data.verified);
  const store = useMemo(() => serverStore(projectId, reason), [projectId, reason]);
  const error = project.error ?? me.error;
  if (error) {
    return (
      <PageFrame title={text.errors.pageMissingTitle}>
        <ErrorBar error={error}>
          <ButtonLink to="/home">{text.common.home}</ButtonLink>
        </ErrorBar>
      </PageFrame>
    );
  }
  if (!project.data || !me.data) {
    return (
      <PageFrame title={text.common.loading} isTitleHidden>
        <Loading />
      </PageFrame>
    );
  }
  return (
    <ProjectStoreProvider store={store}>{children({ project: project.data, me: me.data, team })}</ProjectStoreProvider>
  );
}
