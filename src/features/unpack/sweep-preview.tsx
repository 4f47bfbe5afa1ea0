import { lazy, Suspense, useMemo } from 'react';
import type { ChartContent } from '../../../shared/drawing/chart-input.js';
import { text } from '../../../shared/text.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Findings } from '../../components/findings.js';
import { Loading } from '../../components/loading.js';
import { usePreferences } from '../../lib/preferences.js';
import { FileLines } from './file-lines.js';
import type { Entry } from './unpack-entry.js';

const SweepChart = lazy(() =>
  import('../../components/chart/sweep-chart.js').then(({ SweepChart: Component }) => ({ default: Component })),
);

/** What the file holds as it is read now: its curve, what was noticed, its first lines. */
export function SweepPreview({ entry }: { entry: Entry }) {
  const { outcome, state, sameAs, error } = entry;
  const file = outcome && 'file' in outcome ? outcome.file : undefined;
  return (
    <div className="flex min-w-0 flex-col gap-4">
      {state === 'not-stored' && error !== undefined && <ErrorBar error={error} />}
      {state === 'here' && sameAs !== undefined && <p className="bg-info-wash p-3">{text.unpack.here(sameAs)}</p>}
      {outcome && 'refused' in outcome && <ErrorBar error={outcome.refused} />}
      {!outcome && state === 'reading' && <Loading />}
      {file && <PreviewChart entry={entry} />}
      {file && file.findings.length > 0 && (
        <div>
          <h3 className="mb-2 font-semibold">{text.unpack.remarks}</h3>
          <Findings findings={file.findings} />
        </div>
      )}
      {outcome && outcome.lines.length > 0 && (
        <div>
          <h3 className="mb-2 font-semibold">{text.unpack.linesTitle}</h3>
          <FileLines lines={outcome.lines} reading={file?.reading} />
        </div>
      )}
    </div>
  );
}

function PreviewChart({ entry: { id, name, outcome } }: { entry: Entry }) {
  const { locale } = usePreferences();
  const file = outcome && 'file' in outcome ? outcome.file : undefined;
  const content = useMemo((): ChartContent | undefined => {
    if (!file) return undefined;
    const isPhaseTurned = file.reading.phaseSign === 'turned';
    return { sweeps: [{ id, name, lineNumber: 1, points: file.points }], isPhaseTurned };
  }, [file, id, name]);
  if (!content) return null;
  return (
    <Suspense fallback={<Loading />}>
      <SweepChart
        key={id}
        content={content}
        className="h-96 w-full"
        controls="none"
        twins="below"
        {...(locale ? { locale } : {})}
      />
    </Suspense>
  );
}
