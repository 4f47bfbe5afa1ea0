import { classNames } from '../lib/class-names.js';

const HUMP = 'M3 19c5 0 6.400-1.300 8-6.400C12.400 8.300 13.300 5 16 5s3.600 3.300 5 7.600c1.600 5.100 3 6.400 8 6.400';

/** The product's mark: one hump line over a short baseline. */
export function Mark({ size = 28 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 32 32" fill="none" strokeLinecap="round" strokeWidth="2.6" aria-hidden>
      <path d={HUMP} className="stroke-heather" />
      <path d="M9 26h14" className="stroke-ink" />
    </svg>
  );
}

/** The hump as an outline: dashed where nothing is yet, drawing itself while something comes. */
export function HumpLine({ kind, className }: { kind: 'empty' | 'coming'; className?: string }) {
  return (
    <svg viewBox="0 0 32 32" fill="none" strokeLinecap="round" className={classNames('size-24', className)} aria-hidden>
      <path
        d={HUMP}
        pathLength={kind === 'coming' ? 1 : undefined}
        strokeWidth="1"
        strokeDasharray={kind === 'coming' ? '1' : '1.6 1.6'}
        className={classNames('stroke-edge', kind === 'coming' && 'animate-trace')}
      />
      <path d="M4 24h24" strokeWidth="1" className="stroke-edge" />
    </svg>
  );
}
