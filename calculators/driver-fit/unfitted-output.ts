import type { Finding, Marker, Output } from '../../shared/output.js';
import { figureList } from './figure-list.js';
import type { Measured } from './measured.js';

const OF_MODELS = new Set('Le L1 L2 R2 K n Kr Xr Ki Xi Leb Rss lambda kappa tau'.split(' '));

/** What is left to say of a sweep that holds no driver's resonance: no figure is a guess. */
export function unfittedOutput(free: Measured | undefined, findings: readonly Finding[]): Output {
  const isFlipped = free?.kind.kind === 'phase-sign-flipped';
  const isDouble = free?.kind.kind === 'driver' && free.kind.others.length > 0;
  const note = isFlipped
    ? 'Not known: the phase of the free-air sweep runs the wrong way.'
    : isDouble
      ? 'Not known: the free-air sweep has more than one resonance.'
      : 'Not known: no resonance was found in the free-air sweep.';
  return {
    summary: 'No figure can be trusted: look at the findings first.',
    figures: figureList.filter(({ id }) => !OF_MODELS.has(id)).map(({ id, unit }) => ({ id, unit, value: null, note })),
    traces: [],
    markers: markersOf(free),
    findings: [...findings],
    tables: [],
  };
}

function markersOf(free: Measured | undefined): Marker[] {
  if (free?.kind.kind !== 'driver') return [];
  return [free.kind.main, ...free.kind.others].map(({ frequencyHz }) => ({
    frequency: frequencyHz,
    label: 'Resonance',
  }));
}
