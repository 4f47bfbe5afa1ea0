import { X } from 'lucide-react';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { type StatusTone, StatusWord } from '../../components/status-word.js';
import { classNames } from '../../lib/class-names.js';
import { errorWords } from '../../lib/error-words.js';
import { canBeStored, type Entry, type EntryState, firstQuestion, missingCondition } from './unpack-entry.js';

const STATE_LOOK: Record<EntryState, { tone: StatusTone; sign?: string }> = {
  reading: { tone: 'plain' },
  ready: { tone: 'within' },
  look: { tone: 'old', sign: '●' },
  refused: { tone: 'out' },
  here: { tone: 'info' },
  storing: { tone: 'plain' },
  stored: { tone: 'within' },
  'not-stored': { tone: 'out' },
};

interface FileListProps {
  entries: readonly Entry[];
  chosenId: string | undefined;
  isStoring: boolean;
  onChoose: (id: string) => void;
  onRemove: (id: string) => void;
}

/** Every file with its own state, progress and a way out. */
export function FileList({ entries, chosenId, isStoring, onChoose, onRemove }: FileListProps) {
  return (
    <ul
      aria-label={text.unpack.filesTitle}
      className="max-h-[50dvh] min-h-0 overflow-y-auto border-t border-line md:max-h-none"
    >
      {entries.map((entry) => (
        <li
          key={entry.id}
          className={classNames(
            'flex items-start border-b border-line [content-visibility:auto]',
            entry.id === chosenId && 'bg-heather-wash',
          )}
        >
          <button
            type="button"
            aria-current={entry.id === chosenId ? 'true' : undefined}
            onClick={() => onChoose(entry.id)}
            className="min-h-(--control) min-w-0 flex-1 px-2 py-2 text-start -outline-offset-2!"
          >
            <span className="block font-medium break-all">{entry.file.name}</span>
            <EntryStatus entry={entry} />
          </button>
          {!isStoring && (
            <Button
              look="quiet"
              isIconOnly
              className="mt-1"
              icon={<X size={18} aria-hidden />}
              aria-label={text.unpack.removeFile(entry.file.name)}
              onClick={() => onRemove(entry.id)}
            />
          )}
        </li>
      ))}
    </ul>
  );
}

function EntryStatus({ entry }: { entry: Entry }) {
  const { state, share, file } = entry;
  const reason = reasonOf(entry);
  return (
    <span className="mt-1 flex flex-wrap items-center gap-2">
      <StatusWord {...STATE_LOOK[state]}>{text.unpack.states[state]}</StatusWord>
      {(state === 'reading' || state === 'storing') && (
        <progress
          aria-label={text.unpack.progressOf(file.name)}
          value={share}
          max={1}
          className="h-1.5 w-24 accent-heather"
        />
      )}
      {reason && <span className="text-note text-soft">{reason}</span>}
    </span>
  );
}

function reasonOf(entry: Entry): string {
  const { state, outcome, sameAs, error } = entry;
  if (state === 'refused' && outcome && 'refused' in outcome) return text.errors.refusedFiles[outcome.refused.code];
  if (state === 'here' && sameAs !== undefined) return text.unpack.alreadyHereAs(sameAs);
  if (state === 'not-stored') return errorWords(error).title;
  const missing = canBeStored(entry) ? missingCondition(entry) : undefined;
  if (missing) return missing === 'addedMassKg' ? text.unpack.lacksMass : text.unpack.lacksVolume;
  return state === 'look' ? firstQuestion(entry) : '';
}
