import type { OutOfDateReason } from './contracts/result.js';

/** What a result was made from, as it is found today. */
export interface Lineage {
  readonly calculator: { readonly made: number; readonly now: number | undefined }; // undefined: not in the registry
  readonly setup: { readonly made: number; readonly now: number } | undefined;
  readonly sweeps: readonly SweepLineage[];
}
export interface SweepLineage {
  readonly sweepId: string;
  readonly isDeleted: boolean;
  readonly made: { readonly number: number; readonly pointsSha256: string };
  readonly now: { readonly number: number; readonly pointsSha256: string };
}

/**
 * What has moved on since a result was made; empty while it is current. A newer reading counts only when it gave other
 * points: the same points give the same result.
 */
export function outOfDateReasons(lineage: Lineage): OutOfDateReason[] {
  const reasons: OutOfDateReason[] = [];
  const { calculator, setup, sweeps } = lineage;
  if (calculator.now !== undefined && calculator.now > calculator.made)
    reasons.push({ what: 'calculator', from: String(calculator.made), to: String(calculator.now) });
  if (setup && setup.now > setup.made) reasons.push({ what: 'setup', from: String(setup.made), to: String(setup.now) });
  const told = new Set<string>();
  for (const { sweepId, isDeleted, made, now } of sweeps) {
    if (told.has(sweepId)) continue;
    const from = String(made.number);
    if (isDeleted) reasons.push({ what: 'sweep-deleted', sweepId, from, to: '' });
    else if (now.number > made.number && now.pointsSha256 !== made.pointsSha256)
      reasons.push({ what: 'reading', sweepId, from, to: String(now.number) });
    else continue;
    told.add(sweepId);
  }
  return reasons;
}
