import type { Range, ScaleKind } from '../../../shared/drawing/scales/axis-scale.js';
import { usableRange } from '../../../shared/drawing/scales/ranges.js';
import { parseQuantity } from '../../../shared/quantity-parse.js';
import { text } from '../../../shared/text.js';
import type { AxisName } from './chart-view.js';

const SI_UNIT: Readonly<Record<AxisName, string>> = {
  frequency: 'Hz',
  magnitude: 'Ω',
  phase: '°',
  real: 'Ω',
  imaginary: 'Ω',
};
const words = text.chart.controls;

/** Both ends as numbers, or why they are none. */
export function readEnds(ends: readonly string[], axis: AxisName, kind: ScaleKind, locale?: string): Range | string {
  const [low, high] = ends.map((typed) => {
    return parseQuantity(typed, SI_UNIT[axis], undefined, locale)?.valueSi ?? Number.NaN;
  });
  if (low === undefined || high === undefined || Number.isNaN(low + high)) return words.rangeNumber;
  if (kind === 'log' && low <= 0) return words.rangePositive;
  return high > low && usableRange([low, high], kind) ? [low, high] : words.rangeOrder;
}
