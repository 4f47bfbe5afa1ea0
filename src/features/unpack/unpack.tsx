import { useEffect, useState, useSyncExternalStore } from 'react';
import { text } from '../../../shared/text.js';
import { ChooseFiles } from '../../components/drop-area.js';
import { DropPage } from '../../components/drop-page.js';
import { showToast } from '../../components/toast-store.js';
import { takeHandedFiles } from '../../lib/handed-files.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useFetchAgain } from '../../lib/project-store/store-mutations.js';
import { warmReaders } from '../../workers/pool.js';
import { EntryDetails } from './entry-details.js';
import { FileList } from './file-list.js';
import { SweepPreview } from './sweep-preview.js';
import { UnpackFoot } from './unpack-foot.js';
import { type StoredBatch, UnpackSession } from './unpack-session.js';
import { UnpackStart } from './unpack-start.js';

interface UnpackProps {
  /** The sweeps are stored. The message with Undo is shown already. */
  onAdded: (batch: StoredBatch) => void;
}

/** From dropped files to stored sweeps, for whatever project stands above: on the server or in this browser. */
export function Unpack({ onAdded }: UnpackProps) {
  const store = useProjectStore();
  const [session] = useState(() => new UnpackSession(store));
  const state = useSyncExternalStore(session.subscribe, session.getState);
  const [chosen, setChosen] = useState<string>();
  const onStored = useAnnounce(onAdded);
  useEffect(() => {
    warmReaders();
    session.resume();
    const handed = takeHandedFiles();
    if (handed.length > 0) session.addFiles(handed);
    return () => session.dispose();
  }, [session]);
  const { entries, isStoring } = state;
  const entry = entries.find(({ id }) => id === chosen) ?? entries[0];
  const addFiles = (files: File[]) => session.addFiles(files);
  return (
    <DropPage onFiles={addFiles} isOff={isStoring}>
      {entry === undefined ? (
        <UnpackStart onFiles={addFiles} />
      ) : (
        <>
          <div className="grid gap-6 md:grid-cols-[16rem_minmax(0,1fr)] xl:grid-cols-[18rem_minmax(0,1fr)_20rem]">
            <section
              aria-label={text.unpack.filesTitle}
              className="flex flex-col gap-3 md:sticky md:top-18 md:max-h-[calc(100dvh-10rem)] md:self-start"
            >
              <FileList
                {...{ entries, isStoring }}
                chosenId={entry.id}
                onChoose={setChosen}
                onRemove={(id) => session.remove(id)}
              />
              <div className="flex">
                <ChooseFiles label={text.unpack.chooseLabel} onFiles={addFiles} isQuiet />
              </div>
            </section>
            <section
              aria-label={text.unpack.previewTitle}
              className="min-w-0 xl:sticky xl:top-18 xl:max-h-[calc(100dvh-10rem)] xl:self-start xl:overflow-y-auto"
            >
              <h2 className="mb-3 text-title break-all">{entry.file.name}</h2>
              <SweepPreview entry={entry} />
            </section>
            <div className="md:col-start-2 xl:col-start-auto">
              <EntryDetails
                key={entry.id}
                {...{ entry, session }}
                others={entries.filter(({ id }) => id !== entry.id)}
              />
            </div>
          </div>
          <UnpackFoot {...{ state, session, onStored }} readOnlyReason={store.readOnlyReason} />
        </>
      )}
    </DropPage>
  );
}

/** Says what was added, with the way back, and fetches the lists again. */
function useAnnounce(onAdded: (batch: StoredBatch) => void) {
  const store = useProjectStore();
  const fetchAgain = useFetchAgain('sweeps');
  return async (batch: StoredBatch) => {
    const count = batch.sweeps.length;
    const takeBack = async () => {
      await store.undoBatch(batch.batchId);
      showToast({ message: text.unpack.takenBack(count) });
      await fetchAgain();
    };
    showToast({
      message: text.unpack.added(count),
      action: {
        label: text.common.undo,
        run: () => void takeBack().catch((error: Error) => showToast({ message: error.message, tone: 'fault' })),
      },
    });
    await fetchAgain();
    onAdded(batch);
  };
}
