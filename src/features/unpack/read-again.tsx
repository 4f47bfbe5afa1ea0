import { useQuery } from '@tanstack/react-query';
import { type ReactNode, useEffect, useMemo, useState } from 'react';
import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { showToast } from '../../components/toast-store.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useReread } from '../../lib/project-store/store-mutations.js';
import { toldOverrides } from '../../lib/told-overrides.js';
import { type ReadOutcome, readInWorker } from '../../workers/pool.js';
import { JobStopped } from '../../workers/worker-pool.js';
import { ReadingRule } from './reading-rule.js';
import { SweepPreview } from './sweep-preview.js';
import { newEntry, ruleToShow, stateAfterReading } from './unpack-entry.js';

interface ReadAgainProps {
  sweep: SweepRow;
  /** What stands beside the curve; the rule is handed over to find its place there. The rule alone if left out. */
  aside?: (rule: ReactNode) => ReactNode;
}

/** A stored sweep as its rule reads it; a corrected rule shows what it gives, and is stored as a new revision. */
export function ReadAgain({ sweep, aside }: ReadAgainProps) {
  const store = useProjectStore();
  const reread = useReread();
  const stored = useMemo(() => toldOverrides(sweep.revision.reading), [sweep.revision.reading]);
  const [overrides, setOverrides] = useState<ReadingOverrides>(stored);
  const source = useQuery({
    queryKey: [store.key, 'sources', sweep.source.id],
    queryFn: () => store.sourceBytes(sweep),
    staleTime: Number.POSITIVE_INFINITY,
  });
  const file = useMemo(() => source.data && new File([source.data.file], source.data.fileName), [source.data]);
  const outcome = useReading(file, overrides);
  if (source.error) return <ErrorBar error={source.error} />;
  if (!file || !outcome) return <Loading />;
  const entry = {
    ...newEntry(file),
    ...{ id: sweep.id, name: sweep.name, overrides, outcome, reading: sweep.revision.reading },
    state: stateAfterReading(outcome),
  };
  const rule = ruleToShow(entry);
  const isSame = JSON.stringify(overrides) === JSON.stringify(stored);
  const storeReading = async () => {
    const { revision } = await reread.mutateAsync({ sweep, reading: overrides });
    const isUnchanged = revision.pointsSha256 === sweep.revision.pointsSha256;
    const done = text.project.readAgainDone(revision.number);
    showToast({ message: isUnchanged ? `${done} ${text.project.sameReading}` : done });
  };
  const ruleForm = (
    <div className="flex flex-col gap-4">
      {rule && <ReadingRule reading={rule} overrides={overrides} onChange={setOverrides} />}
      <p className="text-note text-soft">{text.project.readAgainHint}</p>
      <Button
        look="primary"
        className="self-start"
        reason={store.readOnlyReason ?? (isSame ? text.project.sameRule : undefined)}
        isBusy={reread.isPending}
        onClick={() => void storeReading().catch(() => {})}
      >
        {text.project.readAgain}
      </Button>
      {reread.isError && <ErrorBar error={reread.error} />}
    </div>
  );
  return (
    <div className="grid gap-6 lg:grid-cols-[minmax(0,1fr)_22rem]">
      <section aria-label={text.unpack.previewTitle} className="min-w-0">
        <h2 className="sr-only">{text.unpack.previewTitle}</h2>
        <SweepPreview entry={entry} />
      </section>
      {aside ? aside(ruleForm) : ruleForm}
    </div>
  );
}

/** The file as these words read it, worked out anew at each change; undefined until the first is there. */
function useReading(file: File | undefined, overrides: ReadingOverrides): ReadOutcome | undefined {
  const [outcome, setOutcome] = useState<ReadOutcome>();
  useEffect(() => {
    if (!file) return;
    const job = readInWorker({ file, fileName: file.name, overrides });
    job.done.then(setOutcome).catch((error: unknown) => {
      if (!(error instanceof JobStopped)) throw error;
    });
    return () => job.stop();
  }, [file, overrides]);
  return outcome;
}
