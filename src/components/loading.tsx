import { useEffect, useState } from 'react';
import { text } from '../../shared/text.js';
import { Button } from './button.js';
import { HumpLine } from './mark.js';

const QUIET_MS = 300; // nothing moves for what is quick
const PATIENCE_MS = 4000; // then a sentence, and a way to stop where there is one

export function Loading({ onStop }: { onStop?: () => void }) {
  const [stage, setStage] = useState<'quiet' | 'shown' | 'long'>('quiet');
  useEffect(() => {
    const shown = setTimeout(() => setStage('shown'), QUIET_MS);
    const long = setTimeout(() => setStage('long'), PATIENCE_MS);
    return () => {
      clearTimeout(shown);
      clearTimeout(long);
    };
  }, []);
  return (
    <div role="status" className="flex min-h-40 flex-col items-center justify-center gap-3">
      {stage !== 'quiet' && <HumpLine kind="coming" />}
      <span className={stage === 'long' ? 'text-soft' : 'sr-only'}>
        {stage === 'long' ? text.common.stillLoading : text.common.loading}
      </span>
      {stage === 'long' && onStop && <Button onClick={onStop}>{text.common.stop}</Button>}
    </div>
  );
}
