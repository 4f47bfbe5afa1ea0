import { Download } from 'lucide-react';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Findings } from '../../components/findings.js';
import { When } from '../../components/when.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { shownRange } from '../../lib/quantity-words.js';
import { saveFile } from '../../lib/save-file.js';

const words = text.project;

/** The file behind a sweep, what it holds, and what was noticed on reading it. */
export function SweepFacts({ sweep }: { sweep: SweepRow }) {
  const store = useProjectStore();
  const { source, revision } = sweep;
  const download = async () => {
    const { file, fileName } = await store.sourceBytes(sweep);
    saveFile(file, fileName);
  };
  const rows: [string, React.ReactNode][] = [
    [
      words.source,
      <span key="name" className="break-all">
        {source.fileName}
      </span>,
    ],
    [
      words.fingerprint,
      <span key="hash" className="font-num text-note break-all">
        {source.sha256}
      </span>,
    ],
    [words.columns.range, shownRange(revision.minFrequencyHz, revision.maxFrequencyHz)],
    [words.columns.points, `${revision.points}${revision.hasPhase ? '' : `, ${words.noPhase}`}`],
    [words.columns.added, <When key="when" iso={sweep.createdAt} />],
  ];
  return (
    <div className="flex flex-col items-start gap-4">
      <table className="w-full border-collapse">
        <tbody>
          {rows.map(([label, value]) => (
            <tr key={label} className="border-b border-line align-top">
              <th scope="row" className="w-36 py-2 pe-3 text-start font-normal text-soft">
                {label}
              </th>
              <td className="py-2">{value}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <Button icon={<Download size={18} aria-hidden />} onClick={() => void download()}>
        {words.download}
      </Button>
      {revision.findings.length > 0 && (
        <div>
          <h3 className="mb-2 font-semibold">{text.unpack.remarks}</h3>
          <Findings findings={revision.findings} />
        </div>
      )}
      {revision.reading.comments.length > 0 && (
        <details className="w-full">
          <summary className="min-h-6 py-1">{words.comments}</summary>
          <pre className="overflow-x-auto bg-sunken p-3 font-num text-note">{revision.reading.comments.join('\n')}</pre>
        </details>
      )}
    </div>
  );
}
