import type { Table } from '../../../shared/output.js';
import { roundedHz } from '../derive/figures.js';
import type { Analysis } from '../fitting/analysis.js';
import type { BandResult } from '../fitting/bands.js';
import { coilName } from '../fitting/candidates.js';
import type { LeftBehind } from '../fitting/free-air-models.js';

type Row = Table['rows'][number];

/** Every model tried, best first: what the choice rests on. */
export function modelTable({ analysis, upToHz }: BandResult): Table {
  const { ranking, behind } = analysis;
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
    rows: [
      ...ranking.map((_, place) => fittedRow(analysis, place)),
      ...behind.map((model) => behindRow(analysis, model)),
    ],
  };
}

function fittedRow({ ranking, effectiveRows, setup }: Analysis, place: number): Row {
  const best = Math.min(...ranking.map(({ bic }) => bic));
  const { candidate, bic, aicc, weight, sameAs } = ranking[place] ?? (ranking[0] as (typeof ranking)[number]);
  const fitted = (id: string): number | null => {
    const k = candidate.problem.parameters.findIndex((parameter) => parameter.id === id);
    return candidate.fit.values[k] ?? null;
  };
  return {
    coil: coilName(candidate),
    suspension: candidate.suspension,
    bic,
    deltaBic: bic - best,
    aicc,
    misfit: misfitOf(candidate.squares, candidate, setup),
    weight,
    parameters: candidate.freeParameters,
    Re: fitted('Re'),
    fs: fitted('fs'),
    Qms: fitted('Qms'),
    Qes: fitted('Qes'),
    rows: effectiveRows,
    status: candidate.fit.status,
    remark: sameAs ? `Has shrunk to ${sameAs}` : '',
    isChosen: place === 0,
  };
}

function behindRow({ setup }: Analysis, { choice, bic, squares, freeParameters }: LeftBehind): Row {
  const free = setup.sweeps[0]?.rows.counts.reduce((a, b) => a + b, 0) ?? 1;
  return {
    coil: coilName(choice),
    suspension: choice.suspension,
    bic: null,
    deltaBic: bic,
    aicc: null,
    misfit: Math.sqrt(squares / free),
    weight: 0,
    parameters: freeParameters,
    Re: null,
    fs: null,
    Qms: null,
    Qes: null,
    rows: null,
    status: '',
    remark: 'Far behind in free air',
    isChosen: false,
  };
}

/** Relative misfit, rms of |ln(Z/model)|: weighted rows in units of the noise, turned back by the mean noise. */
function misfitOf(
  squares: number,
  { problem }: Analysis['ranking'][number]['candidate'],
  { sweeps }: Analysis['setup'],
): number {
  const rows = problem.activeCount ?? 1;
  const meanSquare = sweeps.reduce((sum, { alone }) => sum + alone.noise ** 2, 0) / sweeps.length;
  return Math.sqrt((squares / rows) * meanSquare * (problem.terms[0]?.groupSize ?? 2));
}
