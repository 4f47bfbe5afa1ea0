import { useEffect, useState } from 'react';
import { text } from '../../../shared/text.js';
import type { RunProgress } from './use-calculator-run.js';

const QUIET_MS = 300;

/** Nothing for 300 ms, then how far the work is and what is in hand. */
export function RunProgressLine({ progress }: { progress: RunProgress }) {
  const [isShown, setIsShown] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setIsShown(true), QUIET_MS);
    return () => clearTimeout(timer);
  }, []);
  if (!isShown) return null;
  const { done, total, label } = progress;
  return (
    <div className="flex items-center gap-3" role="status">
      <progress className="min-w-0 flex-1" value={done} max={total} aria-label={text.sheet.results.running} />
      <span className="font-num text-note">
        {text.sheet.results.progress(done, total)} {label}
      </span>
    </div>
  );
}
