import type { Finding, Severity } from '../../../shared/output.js';
import { formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { type StatusTone, StatusWord } from '../../components/status-word.js';
import { usePreferences } from '../../lib/preferences.js';

const words = text.sheet.results;
const TONES: Record<Severity, { tone: StatusTone; sign: string }> = {
  fault: { tone: 'out', sign: '▲' },
  caution: { tone: 'old', sign: '◆' },
  info: { tone: 'info', sign: '●' },
};
const ORDER: readonly Severity[] = ['fault', 'caution', 'info'];

/** Findings in words, the gravest first; a frequency is a button that puts the cursor there. */
export function FindingsList({
  findings,
  onFrequency,
}: {
  findings: readonly Finding[];
  onFrequency?: (hz: number) => void;
}) {
  const { locale } = usePreferences();
  if (findings.length === 0) return <p className="text-soft">{words.noFindings}</p>;
  const ranked = [...findings].sort((a, b) => ORDER.indexOf(a.severity) - ORDER.indexOf(b.severity));
  return (
    <ul className="flex flex-col gap-2">
      {ranked.map((finding) => {
        const { tone, sign } = TONES[finding.severity];
        const place = finding.frequency;
        const at = place === undefined ? '' : words.at(formatQuantity(place, 'Hz', { locale: locale ?? undefined }));
        return (
          <li key={`${finding.code} ${finding.message}`} className="flex flex-col items-start gap-1">
            <span className="flex flex-wrap items-center gap-2">
              <StatusWord tone={tone} sign={sign}>
                {words.severity[finding.severity]}
              </StatusWord>
              {place !== undefined &&
                (onFrequency ? (
                  <button type="button" className="font-num text-heather underline" onClick={() => onFrequency(place)}>
                    {at}
                  </button>
                ) : (
                  <span className="font-num">{at}</span>
                ))}
            </span>
            <span>{finding.message}</span>
          </li>
        );
      })}
    </ul>
  );
}
