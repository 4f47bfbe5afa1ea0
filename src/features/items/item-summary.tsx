import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { text } from '../../../shared/text.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { itemsQuery } from '../../lib/project-store/store-queries.js';

const MOST_SHOWN = 12;

export function ItemSummary() {
  const store = useProjectStore();
  const { data: items, error } = useQuery(itemsQuery(store));
  if (error) return <ErrorBar error={error} />;
  if (!items) return <Loading />;
  if (items.length === 0) return <p className="text-soft">{text.project.noItemsHint}</p>;
  return (
    <ul>
      {items.slice(0, MOST_SHOWN).map(({ id, name, kind }) => (
        <li key={id} className="flex items-baseline gap-3 border-b border-line py-1">
          <Link
            to={`/p/${store.projectId}/item/${id}`}
            className="min-w-0 flex-1 py-1 font-medium text-heather underline"
          >
            {name}
          </Link>
          <span className="text-note text-soft">{text.project.kinds[kind]}</span>
        </li>
      ))}
      {items.length > MOST_SHOWN && (
        <li className="py-2 text-soft">{text.project.moreItems(items.length - MOST_SHOWN)}</li>
      )}
    </ul>
  );
}
