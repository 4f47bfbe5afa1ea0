import type { Table } from '../../../shared/output.js';
import type { Estimate } from '../derive/estimates.js';
import { CAUSES, type Cause } from '../derive/propagation.js';

const CAUSE_NAMES: Readonly<Record<Cause | 'model' | 'band', string>> = {
  noise: 'Noise of the sweeps',
  mass: 'Added mass',
  'dc-resistance': 'DC resistance told',
  diameter: 'Piston diameter',
  air: 'Air pressure',
  volume: 'Test volume',
  given: 'Given figure',
  model: 'Choice of the model',
  band: 'Part of the sweep, drift',
};
const FIGURES = ['Re', 'fs', 'Qms', 'Qes', 'Qts', 'Mms', 'Cms', 'Bl', 'Vas', 'eta0'] as const;

/** Where the uncertainty of each figure comes from: one row for each cause that counts, the largest first. */
export function budgetTable(estimates: ReadonlyMap<string, Estimate | null>): Table {
  const rows = FIGURES.flatMap((id) => {
    const estimate = estimates.get(id);
    if (!estimate || !(estimate.uncertainty > 0)) return [];
    const { value, uncertainty } = estimate;
    return partsOf(estimate)
      .filter(({ size }) => size > 0.01 * uncertainty)
      .sort((a, b) => b.size - a.size)
      .map(({ cause, size }) => ({
        figure: id,
        cause: CAUSE_NAMES[cause],
        causeId: cause,
        uncertainty: size,
        relative: value === 0 ? null : size / Math.abs(value),
        share: (size / uncertainty) ** 2,
      }));
  });
  return {
    id: 'budget',
    title: 'Where the uncertainty comes from',
    columns: [
      { id: 'figure', label: 'Figure', kind: 'text' },
      { id: 'cause', label: 'Cause', kind: 'text' },
      { id: 'causeId', label: 'Cause id', kind: 'text' },
      { id: 'uncertainty', label: 'Standard uncertainty', kind: 'number' },
      { id: 'relative', label: 'Relative', kind: 'number', unit: '1' },
      { id: 'share', label: 'Share of the variance', kind: 'number', unit: '1' },
    ],
    rows,
  };
}

export interface Part {
  readonly cause: Cause | 'model' | 'band';
  readonly size: number;
}

export function partsOf({ parts, spread, drift }: Estimate): Part[] {
  const own: Part[] = CAUSES.map((cause) => ({ cause, size: parts[cause] ?? 0 }));
  return [...own, { cause: 'model', size: spread }, { cause: 'band', size: drift }];
}

/** The largest cause of a figure's uncertainty, in words; null where it has none. */
export function mainCause(
  estimate: Estimate | null | undefined,
): { cause: Part['cause']; name: string; share: number } | null {
  if (!estimate || !(estimate.uncertainty > 0)) return null;
  const largest = partsOf(estimate).reduce((a, b) => (b.size > a.size ? b : a));
  return { cause: largest.cause, name: CAUSE_NAMES[largest.cause], share: (largest.size / estimate.uncertainty) ** 2 };
}
