import { Plus } from 'lucide-react';
import { type KeyboardEvent, type ReactNode, useMemo, useRef, useState } from 'react';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { EmptyState } from '../../components/empty-state.js';
import { TextField } from '../../components/text-field.js';
import { usePreferences } from '../../lib/preferences.js';
import { LedgerRow } from './ledger-row.js';
import { Pane } from './pane.js';
import { useSheetScene } from './sheet-context.js';
import { draw, drawOnly, putAway, toggleReference } from './sheet-edits.js';
import { useRemoveSweep } from './use-remove-sweep.js';

const words = text.sheet.ledger;

/** The project's sweeps: draw, put away, star, look into. One tab stop a row; arrows move between rows. */
export function LedgerPane({ sizeMenu }: { sizeMenu: ReactNode }) {
  const { sweeps, state, openUnpack, readOnlyReason } = useSheetScene();
  const [wanted, setWanted] = useState('');
  const groups = useMemo(() => grouped(sweeps.filter((sweep) => matches(sweep, wanted))), [sweeps, wanted]);
  const add = (
    <Button look="primary" icon={<Plus size={18} aria-hidden />} reason={readOnlyReason} onClick={() => openUnpack()}>
      {words.add}
    </Button>
  );
  return (
    <Pane id="ledger" title={text.sheet.panes.ledger} actions={sizeMenu}>
      {sweeps.length === 0 ? (
        <EmptyState title={words.empty} action={add}>
          {words.emptyHelp}
        </EmptyState>
      ) : (
        <div className="flex flex-col gap-3 p-3">
          <div className="flex flex-wrap items-end gap-2">
            <TextField
              label={words.search}
              type="search"
              value={wanted}
              onChange={(event) => setWanted(event.target.value)}
              className="min-w-32 flex-1"
            />
            {add}
          </div>
          {groups.length === 0 && (
            <EmptyState
              title={words.noMatch(wanted)}
              action={<Button onClick={() => setWanted('')}>{words.clearSearch}</Button>}
            />
          )}
          <LedgerList groups={groups} drawn={state.content.drawn.map(({ sweepId }) => sweepId)} />
        </div>
      )}
    </Pane>
  );
}

interface Group {
  readonly name: string;
  readonly sweeps: readonly SweepRow[];
}

function LedgerList({ groups, drawn }: { groups: readonly Group[]; drawn: readonly string[] }) {
  const { state, activeSweepId, setActiveSweep, readOnlyReason } = useSheetScene();
  const { letterKeys } = usePreferences();
  const list = useRef<HTMLDivElement>(null);
  const [renaming, setRenaming] = useState<string>();
  const remove = useRemoveSweep();
  const rows = groups.flatMap((group) => group.sweeps);
  const stop = rows.some(({ id }) => id === activeSweepId) ? activeSweepId : rows[0]?.id;
  const act = (key: string, sweep: SweepRow): boolean => {
    const canEdit = readOnlyReason === undefined;
    if (key === 'ArrowDown') focusRow(list.current, rows, sweep.id, 1, setActiveSweep);
    else if (key === 'ArrowUp') focusRow(list.current, rows, sweep.id, -1, setActiveSweep);
    else if (key === ' ') state.edit(drawn.includes(sweep.id) ? putAway(sweep.id) : draw(sweep.id));
    else if (key === 'F2' && canEdit) setRenaming(sweep.id);
    else if (key === 'Delete' && canEdit) remove(sweep);
    else if (key === 'r' && letterKeys) state.edit(toggleReference(sweep.id));
    else return false;
    return true;
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const row = (event.target as HTMLElement).closest<HTMLElement>('[data-row-name]');
    const sweep = rows.find(({ id }) => id === row?.dataset.rowName);
    if (!row || !sweep || event.ctrlKey || event.metaKey || event.altKey) return;
    if (!act(event.key, sweep)) return;
    event.preventDefault();
  };
  return (
    // biome-ignore lint/a11y/useSemanticElements: the rows below hold their own controls; this only hears their keys
    <div
      ref={list}
      onKeyDown={onKeyDown}
      role="group"
      aria-label={text.sheet.panes.ledger}
      className="flex flex-col gap-4"
    >
      {groups.map((group) => (
        <section key={group.name} aria-label={group.name || words.ungrouped}>
          {groups.length > 1 && (
            <h3 className="mb-1 text-note font-semibold text-soft">{group.name || words.ungrouped}</h3>
          )}
          <ul className="flex flex-col">
            {group.sweeps.map((sweep) => (
              <LedgerRow
                key={sweep.id}
                sweep={sweep}
                isTabStop={sweep.id === stop}
                isRenaming={sweep.id === renaming}
                onRenamed={() => setRenaming(undefined)}
                onRename={() => setRenaming(sweep.id)}
                onDrawOnly={() => state.edit(drawOnly(sweep.id))}
                onRemove={() => remove(sweep)}
              />
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

function focusRow(
  list: HTMLElement | null,
  rows: readonly SweepRow[],
  from: string,
  step: number,
  choose: (id: string) => void,
): void {
  const next = rows[rows.findIndex(({ id }) => id === from) + step];
  if (!next) return;
  choose(next.id);
  list?.querySelector<HTMLElement>(`[data-row-name="${next.id}"]`)?.focus();
}

function matches(sweep: SweepRow, wanted: string): boolean {
  const parts = wanted.toLocaleLowerCase().split(/\s+/).filter(Boolean);
  const own = [sweep.name, sweep.group, sweep.source.fileName, ...sweep.tags].join(' ').toLocaleLowerCase();
  return parts.every((part) => own.includes(part));
}

function grouped(sweeps: readonly SweepRow[]): Group[] {
  const names = [...new Set(sweeps.map(({ group }) => group))].sort((a, b) => a.localeCompare(b));
  return names.map((name) => ({ name, sweeps: sweeps.filter(({ group }) => group === name) }));
}
