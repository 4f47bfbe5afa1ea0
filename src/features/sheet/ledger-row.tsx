import { MoreVertical, Star } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { LineSample } from '../../components/chart/line-sample.js';
import { inputClass } from '../../components/field.js';
import { Menu } from '../../components/menu.js';
import { classNames } from '../../lib/class-names.js';
import { usePreferences } from '../../lib/preferences.js';
import { useUpdateRow } from '../../lib/project-store/store-mutations.js';
import { useSheetScene } from './sheet-context.js';
import { draw, putAway, toggleReference } from './sheet-edits.js';
import { SweepDetails } from './sweep-details.js';

const words = text.sheet.ledger;

interface LedgerRowProps {
  sweep: SweepRow;
  isTabStop: boolean;
  isRenaming: boolean;
  onRename: () => void;
  onRenamed: () => void;
  onDrawOnly: () => void;
  onRemove: () => void;
}

/** Draw box, line sample, name with range and points, star, and one warning in words. */
export function LedgerRow({ sweep, isTabStop, isRenaming, onRename, onRenamed, onDrawOnly, onRemove }: LedgerRowProps) {
  const { state, activeSweepId, setActiveSweep, readOnlyReason } = useSheetScene();
  const [isOpen, setIsOpen] = useState(false);
  const line = state.content.drawn.find(({ sweepId }) => sweepId === sweep.id);
  const tabIndex = isTabStop ? 0 : -1;
  const isActive = sweep.id === activeSweepId;
  const blocked = readOnlyReason !== undefined;
  return (
    <li className={classNames('border-t border-line', isActive && 'bg-heather-wash')}>
      <div className="flex min-h-(--row) items-center gap-2 px-1">
        <input
          type="checkbox"
          aria-label={words.draw(sweep.name)}
          checked={line !== undefined}
          tabIndex={tabIndex}
          onChange={() => state.edit(line ? putAway(sweep.id) : draw(sweep.id))}
          onClick={(event) => event.altKey && onDrawOnly()}
          className="size-5 shrink-0 accent-heather"
        />
        <span className="w-9 shrink-0">{line && <LineSample number={line.lineNumber} />}</span>
        {isRenaming ? (
          <RenameField sweep={sweep} onDone={onRenamed} />
        ) : (
          <button
            type="button"
            data-row-name={sweep.id}
            tabIndex={tabIndex}
            aria-current={isActive || undefined}
            aria-expanded={isOpen}
            onClick={() => {
              setActiveSweep(sweep.id);
              setIsOpen(isActive ? !isOpen : isOpen);
            }}
            onDoubleClick={() => !blocked && onRename()}
            className="min-w-0 flex-1 py-1 text-start"
          >
            <span className="block truncate font-medium">{sweep.name}</span>
            <RowFacts sweep={sweep} />
          </button>
        )}
        <Button
          look="quiet"
          isIconOnly
          tabIndex={tabIndex}
          aria-label={words.reference(sweep.name)}
          aria-pressed={line?.isReference ?? false}
          icon={<Star size={18} aria-hidden fill={line?.isReference ? 'currentColor' : 'none'} />}
          onClick={() => state.edit(toggleReference(sweep.id))}
        />
        <Menu
          label={words.details(sweep.name)}
          isIconOnly
          isSkippedByTab={!isTabStop}
          entries={[
            { id: 'details', label: words.detailsShort, onAction: () => setIsOpen(!isOpen) },
            { id: 'only', label: words.drawOnly, onAction: onDrawOnly },
            { id: 'rename', label: words.rename, onAction: onRename, isDisabled: blocked },
            { id: 'remove', label: words.remove, onAction: onRemove, isDanger: true, isDisabled: blocked },
          ]}
        >
          <MoreVertical size={18} aria-hidden />
        </Menu>
      </div>
      {isOpen && <SweepDetails sweep={sweep} />}
    </li>
  );
}

function RowFacts({ sweep }: { sweep: SweepRow }) {
  const { locale } = usePreferences();
  const format = { locale: locale ?? undefined, digits: 3 };
  const { minFrequencyHz, maxFrequencyHz, points, hasPhase } = sweep.revision;
  const range = words.range(
    formatQuantity(minFrequencyHz, 'Hz', format),
    formatQuantity(maxFrequencyHz, 'Hz', format),
    points,
  );
  const { role } = sweep.conditions;
  const warning = rowWarning(sweep);
  return (
    <span className="block text-note text-soft">
      {role !== 'sweep' && <span className="font-medium text-ink">{text.project.roles[role]} · </span>}
      {range}
      {!hasPhase && ` · ${words.magnitudeOnly}`}
      {warning && (
        <span className="block font-medium text-old">
          <span aria-hidden>◆ </span>
          {warning}
        </span>
      )}
    </span>
  );
}

/** The one thing a person should see to before this sweep can be used well. */
export function rowWarning(sweep: SweepRow): string | undefined {
  const { role, addedMassKg, testVolumeM3 } = sweep.conditions;
  if (role === 'added-mass' && addedMassKg === undefined) return words.massNeeded;
  if (role === 'known-volume' && testVolumeM3 === undefined) return words.volumeNeeded;
  return sweep.revision.findings.find(({ severity }) => severity !== 'info')?.message;
}

function RenameField({ sweep, onDone }: { sweep: SweepRow; onDone: () => void }) {
  const field = useRef<HTMLInputElement>(null);
  const update = useUpdateRow('sweeps');
  const [name, setName] = useState(sweep.name);
  useEffect(() => field.current?.select(), []);
  const finish = (isKept: boolean) => {
    if (isKept && name.trim() !== '' && name !== sweep.name)
      update.mutate({ seen: sweep, change: { name: name.trim() } });
    onDone();
  };
  return (
    <input
      ref={field}
      aria-label={words.name}
      value={name}
      maxLength={120}
      className={inputClass}
      onChange={(event) => setName(event.target.value)}
      onBlur={() => finish(true)}
      onKeyDown={(event) => {
        if (event.key === 'Enter') finish(true);
        if (event.key === 'Escape') finish(false);
        event.stopPropagation();
      }}
    />
  );
}
