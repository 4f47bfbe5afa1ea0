import type { Finding } from '../../shared/output.js';
import { text } from '../../shared/text.js';
import { type StatusTone, StatusWord } from './status-word.js';

const TONES: Record<Finding['severity'], { tone: StatusTone; sign: string }> = {
  info: { tone: 'info', sign: '●' },
  caution: { tone: 'old', sign: '▲' },
  fault: { tone: 'out', sign: '▲' },
};

/** What to know or to do, the gravest first. */
export function Findings({ findings }: { findings: readonly Finding[] }) {
  const order = ['fault', 'caution', 'info'];
  const sorted = findings.toSorted((a, b) => order.indexOf(a.severity) - order.indexOf(b.severity));
  return (
    <ul className="flex flex-col gap-2">
      {sorted.map(({ code, severity, message }) => (
        <li key={code + message} className="flex flex-col items-start gap-1">
          <StatusWord {...TONES[severity]}>{text.unpack.severity[severity]}</StatusWord>
          <p>{message}</p>
        </li>
      ))}
    </ul>
  );
}
