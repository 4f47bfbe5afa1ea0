import type { Finding } from '../../shared/output.js';
import { formatQuantity } from '../../shared/quantity-text.js';
import { text } from '../../shared/text.js';
import { usePreferences } from '../lib/preferences.js';
import { type StatusTone, StatusWord } from './status-word.js';

const TONES: Record<Finding['severity'], { tone: StatusTone; sign: string }> = {
  info: { tone: 'info', sign: '●' },
  caution: { tone: 'old', sign: '◆' },
  fault: { tone: 'out', sign: '▲' },
};
const ORDER: readonly Finding['severity'][] = ['fault', 'caution', 'info'];

interface FindingsProps {
  findings: readonly Finding[];
  /** Makes the place of a finding a button: the sheet puts its cursor there. */
  onFrequency?: (hz: number) => void;
}

/** What to know or to do, the gravest first. */
export function Findings({ findings, onFrequency }: FindingsProps) {
  const sorted = findings.toSorted((a, b) => ORDER.indexOf(a.severity) - ORDER.indexOf(b.severity));
  return (
    <ul className="flex flex-col gap-2">
      {sorted.map(({ code, severity, message, frequency }) => (
        <li key={code + message} className="flex flex-col items-start gap-1">
          <span className="flex flex-wrap items-center gap-2">
            <StatusWord {...TONES[severity]}>{text.common.severity[severity]}</StatusWord>
            {frequency !== undefined && <Place hz={frequency} onFrequency={onFrequency} />}
          </span>
          <p>{message}</p>
        </li>
      ))}
    </ul>
  );
}

function Place({ hz, onFrequency }: { hz: number; onFrequency: FindingsProps['onFrequency'] }) {
  const { locale } = usePreferences();
  const words = text.common.atFrequency(formatQuantity(hz, 'Hz', { locale: locale ?? undefined }));
  if (!onFrequency) return <span className="font-num">{words}</span>;
  return (
    <button type="button" className="min-h-6 font-num text-heather underline" onClick={() => onFrequency(hz)}>
      {words}
    </button>
  );
}
