import type { Finding, Output } from '../../shared/output.js';
import { figureList } from './figure-list.js';
import type { Measured } from './measured.js';

const OF_MODELS = new Set('Le L1 L2 R2 K n Kr Xr Ki Xi Leb Rss lambda kappa tau'.split(' '));

/** What is left to say of a sweep that holds no driver's resonance: no figure is a guess. */
export function unfittedOutput(free: Measured | undefined, findings: readonly Finding[]): Output {
  const note = 'Not known: no resonance was found in the free-air sweep.';
  return {
    summary: 'No figure can be trusted: look at the findings first.',
    figures: figureList.filter(({ id }) => !OF_MODELS.has(id)).map(({ id, unit }) => ({ id, unit, value: null, note })),
    traces: [],
    markers: free?.kind.kind === 'driver' ? [{ frequency: free.kind.main.frequencyHz, label: 'fs' }] : [],
    findings: [...findings],
    tables: [],
  };
}
