import { useState } from 'react';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { showToast } from '../../components/toast-store.js';
import { canBeStored, type Entry, missingCondition } from './unpack-entry.js';
import type { StoredBatch, UnpackSession, UnpackState } from './unpack-session.js';

interface UnpackFootProps {
  state: UnpackState;
  session: UnpackSession;
  readOnlyReason: string | undefined;
  onStored: (batch: StoredBatch) => void;
}

/** What holds the adding up, in words; undefined where nothing does. */
function hindrance(entries: readonly Entry[], readOnlyReason: string | undefined): string | undefined {
  if (readOnlyReason !== undefined) return readOnlyReason;
  const reading = entries.filter(({ state }) => state === 'reading').length;
  if (reading > 0) return text.unpack.stillReading(reading);
  const storable = entries.filter(canBeStored);
  const missing = storable.filter((entry) => missingCondition(entry) || entry.name.trim() === '').length;
  if (missing > 0) return text.unpack.stillMissing(missing);
  return storable.length === 0 ? text.unpack.nothingToAdd : undefined;
}

/** How far it is, what could not be read, and the way on. */
export function UnpackFoot({ state, session, readOnlyReason, onStored }: UnpackFootProps) {
  const { entries, isStoring } = state;
  const [error, setError] = useState<unknown>();
  const count = (...states: Entry['state'][]) => entries.filter((entry) => states.includes(entry.state)).length;
  const reading = count('reading');
  const refused = count('refused');
  const failed = count('not-stored');
  const stored = count('stored');
  const storable = entries.filter(canBeStored).length;
  const hindering = hindrance(entries, readOnlyReason);
  const store = async () => {
    setError(undefined);
    const batch = await session.storeAll();
    if (!batch) showToast({ message: text.unpack.stopped });
    else if (session.getState().entries.every((entry) => entry.state !== 'not-stored')) onStored(batch);
  };
  const removeRefused = () => {
    for (const entry of entries) if (entry.state === 'refused') session.remove(entry.id);
  };
  return (
    <div className="sticky bottom-0 z-20 mt-6 flex flex-wrap items-center gap-3 border-t-2 border-ink bg-ground py-3">
      <p role="status" className="flex-1">
        {isStoring
          ? text.unpack.storedCount(stored, stored + storable + count('storing'))
          : text.unpack.count(entries.length - reading - refused, entries.length)}{' '}
        {refused > 0 && text.unpack.notRead(refused, entries.length)}{' '}
        {failed > 0 && text.unpack.notStored(failed, entries.length)} {!isStoring && storable > 0 && hindering}
      </p>
      {error !== undefined && <ErrorBar error={error} />}
      {refused > 0 && !isStoring && <Button onClick={removeRefused}>{text.unpack.removeRefused}</Button>}
      {(reading > 0 || isStoring) && (
        <Button onClick={() => void session.stop().catch(setError)}>{text.common.stop}</Button>
      )}
      {stored > 0 && !isStoring && failed > 0 && (
        <Button onClick={() => onStored(session.batch())}>{text.unpack.goOn(stored)}</Button>
      )}
      <Button look="primary" isBusy={isStoring} reason={hindering} onClick={() => void store().catch(setError)}>
        {text.unpack.add(storable)}
      </Button>
    </div>
  );
}
