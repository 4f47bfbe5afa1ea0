import { useQuery } from '@tanstack/react-query';
import { Trash2 } from 'lucide-react';
import { Link } from 'react-router-dom';
import type { Sheet } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { showToast } from '../../components/toast-store.js';
import { When } from '../../components/when.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useDeleteRow, useRestoreRow } from '../../lib/project-store/store-mutations.js';
import { sheetsQuery } from '../../lib/project-store/store-queries.js';

export function SheetList() {
  const store = useProjectStore();
  const { data: sheets, error } = useQuery(sheetsQuery(store));
  if (error) return <ErrorBar error={error} />;
  if (!sheets) return <Loading />;
  if (sheets.length === 0) return <p className="text-soft">{text.project.noSheets}</p>;
  return (
    <ul>
      {sheets.map((sheet) => (
        <SheetRow key={sheet.id} sheet={sheet} />
      ))}
    </ul>
  );
}

function SheetRow({ sheet }: { sheet: Sheet }) {
  const store = useProjectStore();
  const remove = useDeleteRow('sheets');
  const restore = useRestoreRow('sheets');
  const onDeleted = () =>
    showToast({
      message: text.common.deleted(sheet.name),
      action: { label: text.common.undo, run: () => restore.mutate(sheet.id) },
    });
  return (
    <li className="flex flex-wrap items-center gap-x-3 border-b border-line py-1">
      <Link
        to={`/p/${store.projectId}/sheet/${sheet.id}`}
        className="min-w-0 flex-1 py-1 font-medium text-heather underline"
      >
        {sheet.name}
      </Link>
      <span className="text-note text-soft">
        <When iso={sheet.updatedAt} />
      </span>
      <Button
        look="quiet"
        isIconOnly
        icon={<Trash2 size={18} aria-hidden />}
        aria-label={text.common.deleteNamed(sheet.name)}
        reason={store.readOnlyReason}
        isBusy={remove.isPending}
        onClick={() => void remove.mutateAsync(sheet).then(onDeleted, () => {})}
      />
      {remove.isError && <ErrorBar error={remove.error} />}
    </li>
  );
}
