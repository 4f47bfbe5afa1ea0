import type { Trace } from '../../../shared/output.js';
import { driverImpedance } from '../../acoustics/driver-impedance.js';
import { frequencyGrid } from '../../acoustics/frequency-grid.js';
import { logMisfit } from '../../acoustics/sweep-term.js';
import type { Analysis } from '../fitting/analysis.js';
import type { BandResults } from '../fitting/bands.js';

const PER_DECADE = 160; // points of a curve: a peak of Q 30 keeps its top

/** The fitted curve of every sweep, and what is left between it and the points. Relative misfit: ln(Z/model). */
export function tracesOf({ whole, resonance }: BandResults): Trace[] {
  const traces = whole.analysis.setup.sweeps.flatMap((_, place) => sweepTraces(whole.analysis, place, ''));
  if (resonance === whole) return traces;
  const parts = resonance.analysis.setup.sweeps.flatMap((_, place) =>
    sweepTraces(resonance.analysis, place, '-resonance').filter(({ axis }) => axis === 'impedance'),
  );
  return [...traces, ...parts];
}

function sweepTraces({ setup, outcomes }: Analysis, place: number, suffix: string): Trace[] {
  const [outcome] = outcomes;
  const sweep = setup.sweeps[place];
  const model = outcome.problem.terms[place]?.model;
  if (!sweep || !model) return [];
  const values = outcome.problem.localValues(place, outcome.fit.values);
  const { frequencyHz } = sweep.measured.data.grid;
  const grid = frequencyGrid(evenlySpaced(frequencyHz[0] ?? 1, frequencyHz.at(-1) ?? 1));
  const curve = driverImpedance(model, values, grid);
  const { name, data } = sweep.measured;
  const misfit = logMisfit(model, values, data);
  const number = place === 0 ? '' : `-${place + 1}`;
  return [
    {
      id: `fitted${number}${suffix}`,
      label: `Fitted: ${name}`,
      x: Array.from(grid.frequencyHz),
      re: Array.from(curve.re),
      im: Array.from(curve.im),
      xUnit: 'Hz',
      yUnit: 'Ω',
      axis: 'impedance',
    },
    {
      id: `misfit${number}${suffix}`,
      label: `Misfit: ${name}`,
      x: Array.from(frequencyHz),
      ...(data.hasPhase ? { re: Array.from(misfit.re), im: Array.from(misfit.im) } : { y: Array.from(misfit.re) }),
      xUnit: 'Hz',
      yUnit: '1',
      axis: 'residual',
    },
  ];
}

function evenlySpaced(lowHz: number, highHz: number): Float64Array {
  const points = Math.max(2, Math.ceil(Math.log10(highHz / lowHz) * PER_DECADE));
  const step = Math.log(highHz / lowHz) / (points - 1);
  return Float64Array.from({ length: points }, (_, i) => lowHz * Math.exp(i * step));
}
