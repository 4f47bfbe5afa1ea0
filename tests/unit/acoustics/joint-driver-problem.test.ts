import { describe, expect, it } from 'vitest';
import { type DriverLoad, driverImpedance } from '../../../calculators/acoustics/driver-impedance.js';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';
import { type JointSweep, jointDriverProblem } from '../../../calculators/acoustics/joint-driver-problem.js';
import { sweepData } from '../../../calculators/acoustics/sweep-term.js';
import { coilValues } from '../../../calculators/acoustics/voice-coil.js';
import { leastSquares } from '../../../calculators/numerics/least-squares.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import { InputError } from '../../../shared/errors.js';

const POINTS = 250;
const NOISE = 0.002;
const MMS = 0.0321; // kg
const DRIVER = { re: 6, fs: 30, qms: 4, qes: 0.4 };
const COIL = coilValues('inductor+eddy', { L1: 4e-4, L2: 8e-4, R2: 5 });

interface Loading {
  readonly seed: number;
  readonly load?: DriverLoad;
  readonly loadValues?: readonly number[];
  readonly reOhm?: number;
}

/** A sweep of the driver above under a load; a warmer coil has more Re and, Bl and mass unchanged, more Qes. */
function measured({
  seed,
  load = { mass: false, box: 'none' },
  loadValues = [],
  reOhm = DRIVER.re,
}: Loading): JointSweep {
  const frequencyHz = Float64Array.from({ length: POINTS }, (_, i) => 8 * 2000 ** (i / (POINTS - 1)));
  const values = [reOhm, DRIVER.fs, DRIVER.qms, (DRIVER.qes * reOhm) / DRIVER.re, ...COIL, ...loadValues];
  const z = driverImpedance(
    { coil: 'inductor+eddy', suspension: 'constant', load },
    values,
    frequencyGrid(frequencyHz),
  );
  const random = seededRandom(seed);
  for (let i = 0; i < POINTS; i++) {
    const [re, im, a, b] = [z.re[i]!, z.im[i]!, 1 + NOISE * random.normal(), NOISE * random.normal()];
    z.re[i] = re * a - im * b;
    z.im[i] = re * b + im * a;
  }
  const sweep = {
    name: 'joint',
    frequencyHz,
    realOhm: z.re,
    imaginaryOhm: z.im,
    conditions: { role: 'free-air' as const },
  };
  return { data: sweepData(sweep), weights: new Float64Array(POINTS).fill(1 / NOISE) };
}
const withMass = (seed: number, massKg: number, uncertaintyKg: number, reOhm = DRIVER.re): JointSweep => ({
  ...measured({ seed, load: { mass: true, box: 'none' }, loadValues: [massKg / MMS], reOhm }),
  addedMass: { massKg, uncertaintyKg },
});

function fitOf(sweeps: JointSweep[], starts: Record<string, number> = {}) {
  const problem = jointDriverProblem('inductor+eddy', 'constant', sweeps);
  const guess: Record<string, number> = {
    Re: 6.3,
    fs: 31,
    Qms: 3.5,
    Qes: 0.43,
    L1: 3e-4,
    L2: 9e-4,
    R2: 6,
    Mms: 0.025,
    ...starts,
  };
  const start = problem.parameters.map(({ id }) => guess[id] ?? Number.NaN);
  const fit = leastSquares(problem, start, { absoluteSigma: true });
  const figure = (id: string) => {
    const at = problem.indexOf(id);
    return { value: fit.values[at]!, u: fit.standardErrors[at]! };
  };
  return { problem, fit, figure };
}

describe('a joint fit', () => {
  it('finds Mms from added masses, within its own uncertainty', () => {
    const { fit, figure } = fitOf([measured({ seed: 1 }), withMass(2, 0.01, 0), withMass(3, 0.02, 0)]);
    expect(fit.status).toBe('converged');
    const { value, u } = figure('Mms');
    expect(Math.abs(value - MMS)).toBeLessThan(4 * u);
    expect(u / MMS).toBeLessThan(1e-3);
    expect(figure('fs').value).toBeCloseTo(DRIVER.fs, 1);
  });

  it('takes the uncertainty of the only mass over into Mms: 2 % gives 2 %', () => {
    const { figure } = fitOf([measured({ seed: 1 }), withMass(2, 0.01, 2e-4)], { mass2: 0.01 });
    expect(figure('Mms').u / figure('Mms').value).toBeGreaterThan(0.0199);
    expect(figure('Mms').u / figure('Mms').value).toBeLessThan(0.0205);
    expect(figure('mass2').value).toBeCloseTo(0.01, 6);
  });

  it('finds alpha and the leak of a test box, and the moving mass there where it is left free', () => {
    const box: JointSweep = {
      ...measured({ seed: 5, load: { mass: true, box: 'leaky' }, loadValues: [0.06, 1.5, 9] }),
      box: { kind: 'leaky', massFree: true },
    };
    const { fit, figure } = fitOf([measured({ seed: 4 }), box], { alpha2: 1, QL2: 20, mu2: 0.01 });
    expect(fit.status).toBe('converged');
    for (const [id, truth] of [
      ['alpha2', 1.5],
      ['QL2', 9],
      ['mu2', 0.06],
    ] as const)
      expect(Math.abs(figure(id).value - truth)).toBeLessThan(4 * figure(id).u);
  });

  it('lets a warm sweep have a resistance of its own, its Qes following, the motor shared', () => {
    const warm = { ...withMass(6, 0.02, 0, 6.4), ownRe: true };
    const { problem, fit, figure } = fitOf([measured({ seed: 7 }), warm], { Re2: 6.1 });
    expect(Math.abs(figure('Re').value - 6)).toBeLessThan(4 * figure('Re').u);
    expect(Math.abs(figure('Re2').value - 6.4)).toBeLessThan(4 * figure('Re2').u);
    const local = problem.localValues(1, fit.values);
    expect(local[3]! / ((DRIVER.qes * 6.4) / 6)).toBeCloseTo(1, 2);
  });

  it('has sums and Jacobian that agree with differences of its residual', () => {
    const sweeps = [measured({ seed: 1 }), { ...withMass(2, 0.01, 1e-4, 6.2), ownRe: true }, withMass(3, 0.02, 0)];
    const problem = jointDriverProblem('inductor+eddy', 'constant', sweeps);
    const truth: Record<string, number> = { Re: 6, Re2: 6.2, fs: 30, Qms: 4, Qes: 0.4, Mms: MMS, mass2: 0.01 };
    const values = problem.parameters.map(({ id }, k) => truth[id] ?? COIL[k - problem.indexOf('L1')]!);
    const { residual, parameters, residualCount: n, blocks } = problem;
    const byDifferences = leastSquares({ parameters, residualCount: n, blocks: blocks!, residual }, values, {
      absoluteSigma: true,
    });
    const bySums = leastSquares(problem, values, { absoluteSigma: true });
    expect(bySums.dof).toBe(byDifferences.dof);
    expect(bySums.cost / byDifferences.cost).toBeCloseTo(1, 9);
    for (const k of values.keys()) {
      expect(Math.abs(bySums.values[k]! - byDifferences.values[k]!)).toBeLessThan(1e-4 * bySums.standardErrors[k]!);
      expect(bySums.standardErrors[k]! / byDifferences.standardErrors[k]!).toBeCloseTo(1, 5);
    }
    const jacobian = new Float64Array(n * values.length);
    problem.jacobian!(bySums.values, jacobian);
    const sums = { cost: 0, gradient: new Float64Array(values.length), hessian: new Float64Array(values.length ** 2) };
    problem.normal!(bySums.values, { kind: 'linear', scale: 1 }, sums);
    const column = (k: number) => jacobian.subarray(k * n, (k + 1) * n);
    for (const k of values.keys())
      for (let l = 0; l <= k; l++) {
        const dot = column(k).reduce((sum, value, i) => sum + value * column(l)[i]!, 0);
        const size = Math.sqrt(sums.hessian[k * values.length + k]! * sums.hessian[l * values.length + l]!);
        expect(Math.abs(sums.hessian[k * values.length + l]! - dot) / size).toBeLessThan(1e-9);
      }
  });

  it('refuses to be without sweeps, and to speak of parameters it has not', () => {
    expect(() => jointDriverProblem('inductor', 'constant', [])).toThrow(InputError);
    const problem = jointDriverProblem('inductor', 'constant', [measured({ seed: 1 })]);
    expect(() => problem.indexOf('Mms')).toThrow(expect.objectContaining({ code: 'bad-setting', where: 'Mms' }));
  });
});
