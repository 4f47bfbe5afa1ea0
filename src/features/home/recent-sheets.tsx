import { useQueries } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Project } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { When } from '../../components/when.js';
import { serverStore } from '../../lib/project-store/server-store.js';
import { sheetsQuery } from '../../lib/project-store/store-queries.js';

const PROJECTS_LOOKED_AT = 5;
const SHEETS_SHOWN = 8;

/** The sheets changed last in the projects changed last. */
export function RecentSheets({ projects }: { projects: readonly Project[] }) {
  const recent = projects.filter(({ counts }) => counts.sheets > 0).slice(0, PROJECTS_LOOKED_AT);
  const lists = useQueries({ queries: recent.map(({ id }) => sheetsQuery(serverStore(id))) });
  const sheets = lists
    .flatMap(({ data = [] }) => data)
    .sort((a, b) => b.updatedAt.localeCompare(a.updatedAt))
    .slice(0, SHEETS_SHOWN);
  const nameOf = new Map(projects.map(({ id, name }) => [id, name]));
  if (sheets.length === 0) {
    return lists.some(({ isPending }) => isPending) ? null : <p className="text-soft">{text.project.noSheets}</p>;
  }
  return (
    <ul>
      {sheets.map(({ id, name, projectId, updatedAt }) => (
        <li key={id} className="flex flex-wrap items-baseline gap-x-3 border-b border-line py-2">
          <Link to={`/p/${projectId}/sheet/${id}`} className="py-1 font-medium text-heather underline">
            {name}
          </Link>
          <span className="text-soft">{text.project.inProject(nameOf.get(projectId) ?? '')}</span>
          <span className="ms-auto text-note text-soft">
            <When iso={updatedAt} />
          </span>
        </li>
      ))}
    </ul>
  );
}
