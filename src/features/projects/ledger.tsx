import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button, ButtonLink } from '../../components/button.js';
import { EmptyState } from '../../components/empty-state.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { TextField } from '../../components/text-field.js';
import { showToast } from '../../components/toast-store.js';
import { newSheet } from '../../lib/new-sheet.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useAddRow, useDeleteRow, useRestoreRow } from '../../lib/project-store/store-mutations.js';
import { itemsQuery, sweepsQuery } from '../../lib/project-store/store-queries.js';
import { SweepTable } from './sweep-table.js';

function matches({ name, group, tags }: SweepRow, words: string): boolean {
  return [name, group, ...tags].some((part) => part.toLocaleLowerCase().includes(words));
}

/** Every sweep of the project: look for them, choose several, draw or delete them. */
export function Ledger() {
  const store = useProjectStore();
  const { data: sweeps, error } = useQuery(sweepsQuery(store));
  const { data: items = [] } = useQuery(itemsQuery(store));
  const [written, setWritten] = useState('');
  const words = useDeferredValue(written.trim().toLocaleLowerCase());
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  if (error) return <ErrorBar error={error} />;
  if (!sweeps) return <Loading />;
  if (sweeps.length === 0) return <EmptyLedger projectId={store.projectId} reason={store.readOnlyReason} />;
  const shown = words === '' ? sweeps : sweeps.filter((sweep) => matches(sweep, words));
  const choose = (ids: readonly string[], isChosen: boolean) => {
    const next = new Set(chosen);
    for (const id of ids) isChosen ? next.add(id) : next.delete(id);
    setChosen(next);
  };
  return (
    <div className="flex flex-col gap-3">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <TextField
          label={text.project.search}
          type="search"
          className="w-full sm:w-80"
          value={written}
          onChange={(event) => setWritten(event.target.value)}
        />
        <SelectionBar chosen={sweeps.filter(({ id }) => chosen.has(id))} onDone={() => setChosen(new Set())} />
      </div>
      {shown.length === 0 ? (
        <EmptyState
          title={text.project.noMatch(written.trim())}
          action={<Button onClick={() => setWritten('')}>{text.project.clearSearch}</Button>}
        />
      ) : (
        <SweepTable
          projectId={store.projectId}
          sweeps={shown}
          itemNames={new Map(items.map(({ id, name }) => [id, name]))}
          chosen={chosen}
          onChoose={choose}
        />
      )}
    </div>
  );
}

function EmptyLedger({ projectId, reason }: { projectId: string; reason: string | undefined }) {
  return (
    <EmptyState
      title={text.project.emptyLedger}
      action={
        reason === undefined && (
          <ButtonLink to={`/p/${projectId}/add`} look="primary">
            {text.project.addSweeps}
          </ButtonLink>
        )
      }
    >
      {reason ?? text.project.emptyLedgerHint}
    </EmptyState>
  );
}

/** What can be done with the chosen sweeps. */
function SelectionBar({ chosen, onDone }: { chosen: readonly SweepRow[]; onDone: () => void }) {
  const store = useProjectStore();
  const navigate = useNavigate();
  const addSheet = useAddRow('sheets');
  const remove = useDeleteRow('sweeps');
  const restore = useRestoreRow('sweeps');
  if (chosen.length === 0) return null;
  const draw = async () => {
    const sheet = await addSheet.mutateAsync(newSheet(chosen.map(({ id }) => id)));
    await navigate(`/p/${store.projectId}/sheet/${sheet.id}`);
  };
  const deleteAll = async () => {
    for (const sweep of chosen) await remove.mutateAsync(sweep);
    onDone();
    showToast({
      message: text.project.deletedSweeps(chosen.length),
      action: {
        label: text.common.undo,
        run: () => {
          for (const { id } of chosen) restore.mutate(id);
        },
      },
    });
  };
  const error = addSheet.error ?? remove.error;
  return (
    <div className="flex flex-wrap gap-2">
      <Button look="primary" reason={store.readOnlyReason} isBusy={addSheet.isPending} onClick={() => void draw()}>
        {text.project.drawSelected(chosen.length)}
      </Button>
      <Button
        look="danger"
        reason={store.readOnlyReason}
        isBusy={remove.isPending}
        onClick={() => void deleteAll().catch(() => {})}
      >
        {text.project.deleteSelected(chosen.length)}
      </Button>
      {error && <ErrorBar error={error} />}
    </div>
  );
}
