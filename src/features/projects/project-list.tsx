import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Project } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { Section } from '../../components/section.js';
import { StatusWord } from '../../components/status-word.js';
import { When } from '../../components/when.js';
import { projectQuery } from '../../lib/projects.js';

/** The invented project that every person may look at, unless it stands among their own already. */
export function DemoProject({ projectId, own }: { projectId: string | null; own: readonly Project[] }) {
  const isNeeded = projectId !== null && !own.some(({ id }) => id === projectId);
  const { data: project } = useQuery({ ...projectQuery(projectId ?? ''), enabled: isNeeded });
  if (!isNeeded || !project) return null;
  return (
    <Section title={text.project.demo}>
      <ProjectList projects={[project]} />
    </Section>
  );
}

export function ProjectList({ projects }: { projects: readonly Project[] }) {
  return (
    <ul className="grid gap-x-8 sm:grid-cols-2">
      {projects.map(({ id, name, note, counts, isInvented, updatedAt }) => (
        <li key={id} className="flex flex-col border-b border-line py-3">
          <div className="flex flex-wrap items-center gap-2">
            <Link to={`/p/${id}`} className="min-w-0 py-1 text-read font-semibold text-heather underline">
              {name}
            </Link>
            {isInvented && <StatusWord tone="plain">{text.project.invented}</StatusWord>}
          </div>
          {note && <p className="line-clamp-2 max-w-prose">{note}</p>}
          <p className="text-note text-soft">
            {text.project.counts(counts)} · <When iso={updatedAt} />
          </p>
        </li>
      ))}
    </ul>
  );
}
