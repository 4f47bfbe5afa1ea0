import { Download, FileSearch } from 'lucide-react';
import { useState } from 'react';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Dialog } from '../../components/dialog.js';
import { Findings } from '../../components/findings.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { PistonDrawing } from './piston-drawing.js';
import { useSheetScene } from './sheet-context.js';

const words = text.sheet.ledger;

/** How the thing was held, what was told with it, how its file was read, and the file itself. */
export function SweepDetails({ sweep }: { sweep: SweepRow }) {
  const { slots } = useSheetScene();
  const store = useProjectStore();
  const [isReading, setIsReading] = useState(false);
  const { conditions, revision, source } = sweep;
  const download = () =>
    void store.sourceBytes(sweep).then(({ file, fileName }) => {
      const link = document.createElement('a');
      link.href = URL.createObjectURL(file);
      link.download = fileName;
      link.click();
      setTimeout(() => URL.revokeObjectURL(link.href), 1000);
    });
  return (
    <div className="flex flex-col gap-4 border-t border-line bg-sheet px-3 py-3">
      {slots.conditions(sweep)}
      {conditions.role === 'free-air' && <PistonDrawing />}
      {revision.findings.length > 0 && (
        <div>
          <h4 className="mb-1 text-note font-semibold">{words.findings}</h4>
          <Findings findings={revision.findings} />
        </div>
      )}
      <dl className="grid grid-cols-[auto_1fr] gap-x-3 gap-y-1 text-note">
        <dt className="text-soft">{words.source}</dt>
        <dd className="min-w-0 font-num break-all">{source.fileName}</dd>
        <dt className="text-soft">{words.fingerprint}</dt>
        <dd className="min-w-0 font-num break-all">{source.sha256}</dd>
      </dl>
      <div className="flex flex-wrap gap-2">
        <Button icon={<FileSearch size={18} aria-hidden />} onClick={() => setIsReading(true)}>
          {words.readAgain}
        </Button>
        <Button icon={<Download size={18} aria-hidden />} onClick={download}>
          {words.downloadSource}
        </Button>
      </div>
      {isReading && (
        <Dialog title={words.readAgain} onClose={() => setIsReading(false)} isFull>
          {slots.readAgain(sweep)}
        </Dialog>
      )}
    </div>
  );
}
