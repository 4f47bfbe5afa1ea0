import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { Item } from '../../../shared/contracts/item.js';
import { text } from '../../../shared/text.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { sweepsQuery } from '../../lib/project-store/store-queries.js';

export function ItemTable({ items }: { items: readonly Item[] }) {
  const store = useProjectStore();
  const { data: sweeps = [] } = useQuery(sweepsQuery(store));
  const countOf = (itemId: string) => sweeps.filter((sweep) => sweep.itemId === itemId).length;
  const { kind, name, serial, published, columns } = text.project;
  return (
    <table className="w-full border-collapse">
      <thead>
        <tr className="border-b-2 border-ink">
          <th scope="col" className="py-2 pe-3 text-start">
            {name}
          </th>
          <th scope="col" className="py-2 pe-3 text-start">
            {kind}
          </th>
          <th scope="col" className="hidden py-2 pe-3 text-start sm:table-cell">
            {serial}
          </th>
          <th scope="col" className="hidden py-2 pe-3 text-end md:table-cell">
            {published}
          </th>
          <th scope="col" className="py-2 text-end">
            {columns.sweeps}
          </th>
        </tr>
      </thead>
      <tbody>
        {items.map((item) => (
          <tr key={item.id} className="border-b border-line">
            <th scope="row" className="py-2 pe-3 text-start">
              <Link to={`/p/${store.projectId}/item/${item.id}`} className="py-0.5 font-medium text-heather underline">
                {item.name}
              </Link>
            </th>
            <td className="py-2 pe-3">{text.project.kinds[item.kind]}</td>
            <td className="hidden py-2 pe-3 sm:table-cell">{item.serial}</td>
            <td className="hidden py-2 pe-3 text-end font-num md:table-cell">{Object.keys(item.published).length}</td>
            <td className="py-2 text-end font-num">{countOf(item.id)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
