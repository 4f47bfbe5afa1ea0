import type { Finding } from '../../../shared/output.js';
import type { Estimate } from '../derive/estimates.js';
import { hertz, litres, percent } from '../findings/finding.js';
import { mainCause } from './budget-table.js';
import type { NextStep } from './next-measurement.js';

const COARSE = 0.03; // relative, at 95 %: beyond it a box comes out wrong

/** One sentence on top: what to trust and how far, and what to repeat. */
export function sentenceOf(
  estimates: ReadonlyMap<string, Estimate | null>,
  findings: readonly Finding[],
  steps: readonly NextStep[],
): string {
  const [fs, qts, vas] = ['fs', 'Qts', 'Vas'].map((id) => estimates.get(id) ?? null);
  if (!fs || !qts) return 'No figure can be trusted: look at the findings first.';
  const trusted = [
    `fs ${hertz(fs.value)} to ${reach(fs)}`,
    `Qts ${Number(qts.value.toPrecision(3))} to ${reach(qts)}`,
    ...(vas ? [`Vas ${litres(vas.value)} to ${reach(vas)}`] : []),
  ];
  const fault = findings.find(({ severity }) => severity === 'fault');
  const worry = findings.find(({ severity }) => severity === 'caution');
  return `${trusted.join(', ')}; ${adviceOf(vas, fault ?? worry, steps)}`;
}

function adviceOf(vas: Estimate | null | undefined, first: Finding | undefined, steps: readonly NextStep[]): string {
  if (first?.severity === 'fault') return 'but there is a fault to look at before any of it is used.';
  const [best] = steps;
  if (!vas) {
    return best ? `for Vas, ${lower(best.action)}.` : 'add a mass or a test box, and the piston diameter, for Vas.';
  }
  const cause = mainCause(vas);
  if (cause && 2 * (vas.uncertainty / Math.abs(vas.value)) > COARSE && best) {
    return `Vas is held back by ${lower(cause.name)}: ${lower(best.action)}.`;
  }
  return first ? 'look at the cautions before you rely on the last digits.' : 'nothing has to be repeated.';
}

/** The half-width at 95 %, relative; the wider side of an uneven interval. */
function reach({ value, uncertainty, interval }: Estimate): string {
  const half = interval ? Math.max(interval.high - value, value - interval.low) : 2 * uncertainty;
  return percent(Math.abs(half / value));
}

const lower = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
