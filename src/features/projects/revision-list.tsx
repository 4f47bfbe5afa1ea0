import { useQuery } from '@tanstack/react-query';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { StatusWord } from '../../components/status-word.js';
import { When } from '../../components/when.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { revisionsQuery } from '../../lib/project-store/store-queries.js';

export function RevisionList({ sweep }: { sweep: SweepRow }) {
  const store = useProjectStore();
  const { data: revisions, error } = useQuery(revisionsQuery(store, sweep.id));
  if (error) return <ErrorBar error={error} />;
  if (!revisions) return <Loading />;
  return (
    <ul>
      {revisions
        .toSorted((a, b) => b.number - a.number)
        .map(({ id, number, points, createdAt }) => (
          <li key={id} className="flex flex-wrap items-baseline gap-x-3 border-b border-line py-2">
            <span className="font-medium">{text.project.revision(number)}</span>
            {id === sweep.revision.id && <StatusWord tone="info">{text.project.newest}</StatusWord>}
            <span className="flex-1 text-soft">{text.project.points(points)}</span>
            <span className="text-note text-soft">
              <When iso={createdAt} />
            </span>
          </li>
        ))}
    </ul>
  );
}
