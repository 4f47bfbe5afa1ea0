import { driverImpedance, FREE_AIR } from '../../calculators/acoustics/driver-impedance.js';
import { driverSweepProblem } from '../../calculators/acoustics/driver-sweep-problem.js';
import { frequencyGrid } from '../../calculators/acoustics/frequency-grid.js';
import { sweepData } from '../../calculators/acoustics/sweep-term.js';
import { COIL_MODELS, type CoilModel, coilValues } from '../../calculators/acoustics/voice-coil.js';
import { driverFit } from '../../calculators/driver-fit/index.js';
import type { ComplexSweep } from '../../calculators/kit/sweep.js';
import { leastSquares } from '../../calculators/numerics/least-squares.js';
import type { LeastSquaresFit, LeastSquaresProblem } from '../../calculators/numerics/least-squares-problem.js';
import { type RandomSource, seededRandom } from '../../calculators/numerics/random.js';
import { median, quantile } from '../../calculators/numerics/statistics.js';
import { type Bench, type Measured, timesOf } from './bench.js';
import { ScipyProcess } from './scipy-process.js';

const POINTS = 600;
const NOISE = 0.005;
const ROUNDS = 8; // ours and theirs in turn, so that both meet the same machine
const BAR = 10; // times faster than SciPy
const WHOLE_BAR_MS = 60;
const UNDISTURBED = 0.1; // of all runs on each side, the time that a tenth keeps under: other work on the machine counts for neither

/** An invented mid-woofer with each coil. */
const COILS: Readonly<Record<CoilModel, Readonly<Record<string, number>>>> = {
  inductor: { Le: 6e-4 },
  'inductor+eddy': { L1: 4e-4, L2: 8e-4, R2: 5 },
  'power-law': { K: 0.0082, n: 0.68 },
  'split-power-law': { Kr: 0.0037, Xr: 0.7, Ki: 0.0065, Xi: 0.72 },
  'semi-inductance': { Leb: 2e-4, Le: 2e-3, K: 0.06, Rss: 30 },
};

interface Case {
  readonly coil: CoilModel;
  readonly problem: LeastSquaresProblem;
  readonly start: Float64Array;
  readonly request: Record<string, unknown>;
}
interface Answer {
  readonly times: number[];
  readonly values: number[]; // scaled
  readonly cost: number;
  readonly evaluations: number;
}

/** A sweep of the invented driver with this coil, and the true fitted values. */
function invented(coil: CoilModel, random: RandomSource): { sweep: ComplexSweep; truth: number[] } {
  const frequencyHz = Float64Array.from({ length: POINTS }, (_, i) => 10 * 2000 ** (i / (POINTS - 1)));
  const truth = [6.1, 42, 4.2, 0.47, ...coilValues(coil, COILS[coil])];
  const z = driverImpedance({ coil, suspension: 'constant', load: FREE_AIR }, truth, frequencyGrid(frequencyHz));
  for (let i = 0; i < POINTS; i++) {
    const [re, im, a, b] = [z.re[i]!, z.im[i]!, 1 + NOISE * random.normal(), NOISE * random.normal()];
    z.re[i] = re * a - im * b;
    z.im[i] = re * b + im * a;
  }
  const conditions = { role: 'free-air' } as const;
  return { sweep: { name: coil, frequencyHz, realOhm: z.re, imaginaryOhm: z.im, conditions }, truth };
}

function caseOf(coil: CoilModel, seed: number): Case {
  const random = seededRandom(seed);
  const { sweep, truth } = invented(coil, random);
  const data = sweepData(sweep);
  const weights = new Float64Array(POINTS).fill(1);
  const problem = driverSweepProblem({ coil, suspension: 'constant', load: FREE_AIR }, data, weights);
  const start = Float64Array.from(truth, (value, k) =>
    problem.parameters[k]!.logScaled ? value * Math.exp(0.15 * random.normal()) : value * (1 + 0.08 * random.normal()),
  );
  const scaled = (value: number, k: number) => (problem.parameters[k]!.logScaled ? Math.log(value) : value);
  const request = {
    coil,
    frequencyHz: [...sweep.frequencyHz],
    re: [...sweep.realOhm],
    im: [...sweep.imaginaryOhm],
    start: [...start].map(scaled),
    lower: problem.parameters.map(({ lower }, k) => scaled(lower!, k)),
    upper: problem.parameters.map(({ upper }, k) => scaled(upper!, k)),
  };
  return { coil, problem, start, request };
}

/** Largest distance between the two optima, in standard errors. */
function distance({ problem }: Case, fit: LeastSquaresFit, { values }: Answer): number {
  const p = problem.parameters.length;
  return values.reduce((largest, theirs, k) => {
    const ours = problem.parameters[k]!.logScaled ? Math.log(fit.values[k]!) : fit.values[k]!;
    return Math.max(largest, Math.abs(ours - theirs) / Math.sqrt(fit.scaledCovariance[k * p + k]!));
  }, 0);
}

async function compared(one: Case, scipy: ScipyProcess): Promise<Measured> {
  const { problem, start, request } = one;
  let fit = leastSquares(problem, start);
  timesOf(() => leastSquares(problem, start), 250); // warm, as in a page that has fitted before
  await scipy.ask<Answer>({ ...request, runs: 3 });
  const ours: number[] = [];
  const theirs: number[] = [];
  let answer: Answer | null = null;
  for (let round = 0; round < ROUNDS; round++) {
    const times = timesOf(() => {
      fit = leastSquares(problem, start);
    }, 40);
    ours.push(...times);
    answer = await scipy.ask<Answer>({ ...request, runs: 10 });
    theirs.push(...answer.times);
  }
  const apart = distance(one, fit, answer!);
  if (!(apart < 0.05))
    throw new Error(`${one.coil}: the two optima lie ${apart.toPrecision(2)} standard errors apart.`);
  const [a, b] = [quantile(ours, UNDISTURBED), quantile(theirs, UNDISTURBED)];
  return {
    name: one.coil,
    value: b / a,
    unit: 'times',
    atLeast: BAR,
    note: `${a.toFixed(3)} ms against ${b.toFixed(2)} ms; ${fit.evaluations} and ${answer!.evaluations} evaluations; optima ${apart.toExponential(0)} u apart`,
  };
}

/** The whole calculator, every coil with every suspension, start and uncertainties included. */
function wholeCalculator(coil: CoilModel): Measured {
  const { sweep } = invented(coil, seededRandom(7));
  const inputs = { 'free-air': [{ sweep, keys: {} }] };
  const settings = driverFit.settings.parse({ pistonDiameter: 0.135 });
  const context = { progress: () => undefined, checkpoint: () => undefined, seed: 1 };
  const run = () => driverFit.run(inputs, settings, context);
  timesOf(run, 1500); // warm
  const times = timesOf(run, 1500);
  const models = run().tables.find(({ id }) => id === 'models')?.rows.length ?? 0;
  return {
    name: `driver-fit with auto, ${coil}`,
    value: quantile(times, UNDISTURBED),
    unit: 'ms',
    atMost: WHOLE_BAR_MS,
    note: `${models} models compared; median ${median(times).toFixed(1)} ms`,
  };
}

export const bench: Bench = {
  title: `One fit of ${POINTS} complex points: speed against scipy.optimize.least_squares (trf, bounds, 2-point)`,
  async run() {
    const scipy = new ScipyProcess('fit_scipy.py');
    try {
      const versions = await scipy.next<{ scipy: string; numpy: string }>();
      console.log(`  SciPy ${versions.scipy}, NumPy ${versions.numpy}, Node ${process.version}`);
      const rows: Measured[] = [];
      for (const [i, coil] of COIL_MODELS.entries()) rows.push(await compared(caseOf(coil, 100 + i), scipy));
      for (const coil of COIL_MODELS) rows.push(wholeCalculator(coil));
      return rows;
    } finally {
      scipy.close();
    }
  },
};
