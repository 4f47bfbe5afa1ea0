import { useQuery } from '@tanstack/react-query';
import { Plus } from 'lucide-react';
import { useState } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';
import type { Me } from '../../shared/contracts/account.js';
import type { Project } from '../../shared/contracts/project.js';
import { text } from '../../shared/text.js';
import { Button } from '../components/button.js';
import { DropPage } from '../components/drop-page.js';
import { EmptyState } from '../components/empty-state.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { Section } from '../components/section.js';
import { TeamSelect } from '../components/team-select.js';
import { AddSweepsDialog } from '../features/home/add-sweeps-dialog.js';
import { RecentSheets } from '../features/home/recent-sheets.js';
import { WaitingList } from '../features/home/waiting-list.js';
import { NewProjectDialog } from '../features/projects/new-project-dialog.js';
import { DemoProject, ProjectList } from '../features/projects/project-list.js';
import { handFiles } from '../lib/handed-files.js';
import { chosenTeam, meQuery } from '../lib/me.js';
import { projectsQuery, reasonAgainst } from '../lib/projects.js';

export function Component() {
  const { data: me, error } = useQuery(meQuery);
  useLocation(); // the team may be named in the address
  if (error) {
    return (
      <PageFrame title={text.project.homeTitle}>
        <ErrorBar error={error} />
      </PageFrame>
    );
  }
  if (!me) {
    return (
      <PageFrame title={text.project.homeTitle}>
        <Loading />
      </PageFrame>
    );
  }
  return <Home me={me} />;
}

function Home({ me }: { me: Me }) {
  const team = chosenTeam(me);
  const { data: projects, error } = useQuery({ ...projectsQuery(team?.id ?? ''), enabled: team !== undefined });
  const [open, setOpen] = useState<'new' | 'add'>();
  const add = useAddFiles(projects ?? [], () => setOpen('add'));
  const newReason = reasonAgainst('project:create', team, me.verified);
  const newButton = (
    <Button
      look={projects?.length === 0 ? 'primary' : 'plain'}
      icon={<Plus size={18} aria-hidden />}
      reason={newReason}
      onClick={() => setOpen('new')}
    >
      {text.project.newProject}
    </Button>
  );
  const addReason = reasonAgainst('source:create', team, me.verified);
  return (
    <DropPage onFiles={add} isOff={addReason !== undefined || !projects?.length}>
      <PageFrame
        title={text.project.homeTitle}
        barContent={<TeamSelect me={me} />}
        actions={
          projects &&
          projects.length > 0 && (
            <Button look="primary" reason={addReason} onClick={() => add([])}>
              {text.project.addSweeps}
            </Button>
          )
        }
      >
        {error && <ErrorBar error={error} />}
        {!projects && !error && <Loading />}
        {projects && <HomeSections {...{ me, projects, newButton }} />}
      </PageFrame>
      {open === 'new' && team && <NewProjectDialog teamId={team.id} onClose={() => setOpen(undefined)} />}
      {open === 'add' && projects && <AddSweepsDialog projects={projects} onClose={() => setOpen(undefined)} />}
    </DropPage>
  );
}

function HomeSections({ me, projects, newButton }: { me: Me; projects: Project[]; newButton: React.ReactNode }) {
  return (
    <>
      <Section title={text.project.waiting}>
        <WaitingList me={me} projects={projects} />
      </Section>
      <Section title={text.project.projects} actions={newButton}>
        {projects.length === 0 ? (
          <EmptyState title={text.project.noProjects}>{text.project.noProjectsHint}</EmptyState>
        ) : (
          <ProjectList projects={projects} />
        )}
      </Section>
      <DemoProject projectId={me.demoProjectId} own={projects} />
      {projects.length > 0 && (
        <Section title={text.project.recentSheets}>
          <RecentSheets projects={projects} />
        </Section>
      )}
    </>
  );
}

/** Files go to the only project there is; with several, the person says which. */
function useAddFiles(projects: readonly Project[], ask: () => void) {
  const navigate = useNavigate();
  return (files: File[]) => {
    handFiles(files);
    const [first, second] = projects;
    if (first && !second) void navigate(`/p/${first.id}/add`);
    else ask();
  };
}
