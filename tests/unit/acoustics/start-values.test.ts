import { describe, expect, it } from 'vitest';
import { FREE_AIR } from '../../../calculators/acoustics/driver-impedance.js';
import { driverSweepProblem } from '../../../calculators/acoustics/driver-sweep-problem.js';
import { motionalStart, startValues } from '../../../calculators/acoustics/start-values.js';
import { SUSPENSION_MODELS } from '../../../calculators/acoustics/suspension.js';
import { sweepData } from '../../../calculators/acoustics/sweep-term.js';
import { COIL_MODELS } from '../../../calculators/acoustics/voice-coil.js';
import { magnitudeOf, type Sweep } from '../../../calculators/kit/sweep.js';
import { leastSquares } from '../../../calculators/numerics/least-squares.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import { type InventedDriver, inventedDriver } from './invented-drivers.js';

const DRIVERS = 300;
const REACHED = 0.5; // of a unit of χ²: nobody could tell the two curves apart by these points

function withoutPhase(sweep: Sweep): Sweep {
  const { name, frequencyHz, conditions } = sweep;
  return { name, frequencyHz, conditions, magnitudeOhm: magnitudeOf(sweep) };
}

/** By how much, in units of χ², the fit from the automatic start misses the best of it and three starts near the truth. */
function shortfall({ coil, suspension, values }: InventedDriver, sweep: Sweep, seed: number) {
  const data = sweepData(sweep);
  const problem = driverSweepProblem(
    { coil, suspension, load: FREE_AIR },
    data,
    new Float64Array(data.re.length).fill(1),
  );
  const auto = leastSquares(problem, startValues(motionalStart(data), coil, suspension));
  const random = seededRandom(seed);
  const costs = [0, 0.3, 0.6].map((spread) => {
    const start = values.map((value, k) =>
      problem.parameters[k]!.logScaled
        ? value * Math.exp(spread * random.normal())
        : value * (1 + 0.3 * spread * random.normal()),
    );
    return leastSquares(problem, start).cost;
  });
  return { status: auto.status, chiSquare: (auto.cost / Math.min(auto.cost, ...costs) - 1) * problem.residualCount };
}

describe('the start from the curve alone', () => {
  it(`leads all of ${DRIVERS} invented drivers, over every model, to the best known cost`, () => {
    const missed: string[] = [];
    for (let seed = 0; seed < DRIVERS; seed++) {
      const driver = inventedDriver(seed, COIL_MODELS[seed % 5]!, SUSPENSION_MODELS[Math.trunc(seed / 5) % 3]!);
      const { status, chiSquare } = shortfall(driver, driver.sweep, seed + 777);
      if (chiSquare > REACHED || status === 'stalled' || status === 'iteration-limit')
        missed.push(`seed ${seed}: ${driver.coil}, ${driver.suspension}, ${status}, ${chiSquare.toFixed(2)}`);
    }
    expect(missed).toEqual([]);
  }, 60_000);

  it('does the same without phase for every coil whose parts |Z| can tell apart', () => {
    const missed: string[] = [];
    const coils = COIL_MODELS.filter((coil) => coil !== 'split-power-law'); // Kr and Ki trade places in |Z|
    for (let seed = 0; seed < 80; seed++) {
      const driver = inventedDriver(seed, coils[seed % 4]!, SUSPENSION_MODELS[Math.trunc(seed / 4) % 3]!);
      const { chiSquare } = shortfall(driver, withoutPhase(driver.sweep), seed + 999);
      if (chiSquare > REACHED)
        missed.push(`seed ${seed}: ${driver.coil}, ${driver.suspension}, ${chiSquare.toFixed(2)}`);
    }
    expect(missed).toEqual([]);
  }, 60_000);

  it('takes the resonance, not the higher rise of the coil at the end of the sweep', () => {
    const driver = inventedDriver(17, 'inductor', 'constant', { noise: 0.01 });
    const { frequencyHz, realOhm, imaginaryOhm } = driver.sweep;
    const tall = imaginaryOhm.map((x, i) => x + 2 * Math.PI * frequencyHz[i]! * 5e-3);
    const sweep = { ...driver.sweep, imaginaryOhm: tall };
    const magnitude = magnitudeOf(sweep);
    const start = motionalStart(sweepData(sweep));
    expect(Math.max(...magnitude)).toBe(magnitude.at(-1));
    expect(start.fsHz / driver.values[1]!).toBeGreaterThan(0.9);
    expect(start.fsHz / driver.values[1]!).toBeLessThan(1.1);
    expect(realOhm.length).toBe(magnitude.length);
  });

  it('is not led astray by a single wild point', () => {
    const driver = inventedDriver(23, 'power-law', 'constant');
    const realOhm = driver.sweep.realOhm.slice();
    realOhm[250]! *= 40;
    const start = motionalStart(sweepData({ ...driver.sweep, realOhm }));
    expect(Math.abs(start.fsHz / driver.values[1]! - 1)).toBeLessThan(0.1);
  });

  it('says that there is no peak when the sweep ends below it or begins above it', () => {
    const fsHz = inventedDriver(31, 'power-law', 'constant').values[1]!;
    const below = inventedDriver(31, 'power-law', 'constant', { low: fsHz / 40, high: fsHz / 1.5, noise: 0 });
    const above = inventedDriver(31, 'power-law', 'constant', { low: fsHz * 1.5, high: fsHz * 10, noise: 0 });
    expect(motionalStart(sweepData(below.sweep)).peak).toBeNull();
    expect(motionalStart(sweepData(above.sweep)).peak).toBeNull();
  });
});
