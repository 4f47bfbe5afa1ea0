import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Item } from '../../../shared/contracts/item.js';
import { text } from '../../../shared/text.js';
import { StatusWord } from '../../components/status-word.js';
import { When } from '../../components/when.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { resultsQuery, sweepsQuery } from '../../lib/project-store/store-queries.js';

/** Every sweep and every kept result of one item, newest first. */
export function ItemHistory({ item }: { item: Item }) {
  const store = useProjectStore();
  const { data: sweeps = [] } = useQuery(sweepsQuery(store));
  const { data: results = [] } = useQuery(resultsQuery(store));
  const own = sweeps.filter(({ itemId }) => itemId === item.id);
  const ownIds = new Set(own.map(({ id }) => id));
  const made = results.filter(
    (result) => result.itemId === item.id || result.inputs.some(({ sweepId }) => ownIds.has(sweepId)),
  );
  return (
    <div className="flex flex-col gap-4">
      {own.length === 0 && <p className="text-soft">{text.project.noSweepsOfItem}</p>}
      <ul>
        {own.map(({ id, name, conditions, createdAt }) => (
          <li key={id} className="flex flex-wrap items-baseline gap-x-3 border-b border-line py-1">
            <Link to={`/p/${store.projectId}/sweep/${id}`} className="flex-1 py-1 text-heather underline">
              {name}
            </Link>
            <span className="text-soft">{text.project.roles[conditions.role]}</span>
            <span className="text-note text-soft">
              <When iso={createdAt} />
            </span>
          </li>
        ))}
      </ul>
      {made.length > 0 && <h3 className="font-semibold">{text.project.resultsOfItem}</h3>}
      <ul>
        {made.map(({ id, name, calculatorId, sheetId, outOfDate, createdAt }) => (
          <li key={id} className="flex flex-wrap items-baseline gap-x-3 border-b border-line py-1">
            <span className="flex-1 py-1">
              {sheetId ? (
                <Link to={`/p/${store.projectId}/sheet/${sheetId}`} className="text-heather underline">
                  {name || calculatorId}
                </Link>
              ) : (
                name || calculatorId
              )}
            </span>
            {outOfDate.length > 0 && <StatusWord tone="old">{text.project.outOfDate}</StatusWord>}
            <span className="text-note text-soft">
              <When iso={createdAt} />
            </span>
          </li>
        ))}
      </ul>
    </div>
  );
}
