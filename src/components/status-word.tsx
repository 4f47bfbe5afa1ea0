import type { ReactNode } from 'react';
import { classNames } from '../lib/class-names.js';

export type StatusTone = 'within' | 'out' | 'old' | 'info' | 'plain';

const TONES: Record<StatusTone, { look: string; sign: string }> = {
  within: { look: 'bg-within-wash text-within', sign: '✓' },
  out: { look: 'bg-out-wash text-out', sign: '▲' },
  old: { look: 'bg-old-wash text-old', sign: '◷' },
  info: { look: 'bg-info-wash text-info', sign: '●' },
  plain: { look: 'bg-sunken text-ink', sign: '' },
};

/** A state in words, with a sign and a colour that only repeat what the word says. */
export function StatusWord({ tone, sign, children }: { tone: StatusTone; sign?: string; children: ReactNode }) {
  const { look, sign: usual } = TONES[tone];
  const shown = sign ?? usual;
  return (
    <span
      className={classNames(
        'inline-flex items-center gap-1 rounded-tag px-2 text-note font-medium whitespace-nowrap',
        look,
      )}
    >
      {shown && <span aria-hidden>{shown}</span>}
      {children}
    </span>
  );
}
