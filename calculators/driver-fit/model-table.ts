import type { Table } from '../../shared/output.js';
import type { BandResult } from './bands.js';
import { coilName } from './candidates.js';
import { roundedHz } from './figures.js';

/** Every model tried, best first: what the choice rests on. */
export function modelTable({ analysis, upToHz }: BandResult): Table {
  const { ranking, effectiveRows } = analysis;
  const best = Math.min(...ranking.map(({ bic }) => bic));
  const values = (ids: readonly string[], entry: (typeof ranking)[number]): (number | null)[] =>
    ids.map(
      (id) => entry.candidate.fit.values[entry.candidate.problem.parameters.findIndex((p) => p.id === id)] ?? null,
    );
  return {
    id: upToHz === null ? 'models' : `models-below-${Math.round(upToHz)}`,
    title: upToHz === null ? 'Models compared' : `Models compared below ${roundedHz(upToHz)}`,
    columns: [
      { id: 'coil', label: 'Voice coil', kind: 'text' },
      { id: 'suspension', label: 'Suspension', kind: 'text' },
      { id: 'bic', label: 'BIC', kind: 'number' },
      { id: 'deltaBic', label: 'BIC above the best', kind: 'number' },
      { id: 'aicc', label: 'AICc', kind: 'number' },
      { id: 'misfit', label: 'Misfit', kind: 'number', unit: '1' },
      { id: 'weight', label: 'Weight', kind: 'number' },
      { id: 'parameters', label: 'Parameters', kind: 'number' },
      { id: 'Re', label: 'Re', kind: 'number', unit: 'Ω' },
      { id: 'fs', label: 'fs', kind: 'number', unit: 'Hz' },
      { id: 'Qms', label: 'Qms', kind: 'number' },
      { id: 'Qes', label: 'Qes', kind: 'number' },
      { id: 'rows', label: 'Independent rows', kind: 'number' },
      { id: 'status', label: 'Fit', kind: 'text' },
      { id: 'remark', label: 'Remark', kind: 'text' },
      { id: 'isChosen', label: 'Chosen', kind: 'boolean' },
    ],
    rows: ranking.map((entry, i) => {
      const [re, fs, qms, qes] = values(['Re', 'fs', 'Qms', 'Qes'], entry);
      return {
        coil: coilName(entry.candidate),
        suspension: entry.candidate.suspension,
        bic: entry.bic,
        deltaBic: entry.bic - best,
        aicc: entry.aicc,
        misfit: misfitOf(
          entry,
          analysis.setup.sweeps.map(({ alone }) => alone.noise),
        ),
        weight: entry.weight,
        parameters: entry.candidate.freeParameters,
        Re: re ?? null,
        fs: fs ?? null,
        Qms: qms ?? null,
        Qes: qes ?? null,
        rows: effectiveRows,
        status: entry.candidate.fit.status,
        remark: entry.sameAs ? `Has shrunk to ${entry.sameAs}` : '',
        isChosen: i === 0,
      };
    }),
  };
}

/** Relative misfit, rms of |ln(Z/model)|: weighted rows in units of the noise, turned back by the mean noise. */
function misfitOf({ candidate }: BandResult['analysis']['ranking'][number], noises: readonly number[]): number {
  const rows = candidate.problem.activeCount ?? 1;
  const meanSquare = noises.reduce((sum, noise) => sum + noise * noise, 0) / noises.length;
  const perPoint = candidate.problem.terms[0]?.groupSize ?? 2;
  return Math.sqrt((candidate.squares / rows) * meanSquare * perPoint);
}
