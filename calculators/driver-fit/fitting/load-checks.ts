import type { DriverFitSettings } from '../settings.js';
import type { ModelChoice } from './candidates.js';
import { type JointSetup, type JointShape, jointCandidate, valuesById } from './joint-fit.js';
import type { SingleFit } from './single-fit.js';

export const RE_LIMIT = 0.02; // common practice: more is a warm coil or a bad contact
const SUSPECT = 0.012; // of Re by itself: worth a try in the joint fit
const CLEARLY_BETTER = 10; // of BIC
export const LEAST_MASS_CHANGE = 0.02; // of Mms
export const LEAKY_BELOW = 20; // QL: sound test boxes reach 30 and more (common practice)

interface Trial {
  readonly shape: JointShape;
  readonly bic: number;
  readonly values: Readonly<Record<string, number>>;
}

/**
 * What the loaded sweeps need beside mass and volume, each only where the joint fit is clearly better with it: a leak of
 * the test box; a moving mass of its own in it (another air load, or something moved), unless a setting decides; a DC
 * resistance of its own for a sweep whose Re is more than 2 % off.
 */
export function jointShape(
  choice: ModelChoice,
  setup: JointSetup,
  freeAir: Readonly<Record<string, number>>,
  { boxMass }: DriverFitSettings,
  checkpoint: () => void,
): JointShape {
  const { sweeps } = setup;
  if (sweeps.length === 1) return setup.shape;
  const rows = sweeps.reduce((sum, sweep) => sum + rowsOf(sweep) / sweep.alone.structure.pointsPerEffective, 0);
  const tried = (shape: JointShape): Trial => {
    const candidate = jointCandidate(choice, { ...setup, shape }, freeAir, checkpoint);
    const bic = rows * Math.log(candidate.squares / rows) + candidate.freeParameters * Math.log(rows);
    return { shape, bic, values: valuesById(candidate.problem, candidate.fit) };
  };
  let best = tried({ ...setup.shape, isBoxMassFree: boxMass === 'unequal' });
  const better = (shape: JointShape, isPlausible: (values: Trial['values']) => boolean): void => {
    const trial = tried(shape);
    if (trial.bic < best.bic - CLEARLY_BETTER && isPlausible(trial.values)) best = trial;
  };
  const box = sweeps.findIndex(({ measured }) => measured.role === 'known-volume') + 1;
  if (box > 0) {
    better({ ...best.shape, boxKind: 'leaky' }, () => true);
    if (boxMass === 'auto') {
      better({ ...best.shape, isBoxMassFree: true }, (values) => Math.abs(values[`mu${box}`] ?? 0) > LEAST_MASS_CHANGE);
    }
  }
  for (const place of suspects(sweeps.map(({ alone }) => alone))) {
    const hasOwnRe = best.shape.hasOwnRe.map((own, i) => own || i === place);
    better({ ...best.shape, hasOwnRe }, (values) => {
      const ratio = (values[`Re${place + 1}`] ?? 1) / (values.Re ?? 1);
      return Math.abs(Math.log(ratio)) > RE_LIMIT;
    });
  }
  return best.shape;
}

const rowsOf = ({ rows: { data } }: JointSetup['sweeps'][number]): number => (data.hasPhase ? 2 : 1) * data.re.length;

function suspects(singles: readonly SingleFit[]): number[] {
  const [free] = singles;
  return singles.flatMap((single, i) => {
    if (!free || i === 0) return [];
    return Math.abs(Math.log(single.reOhm / free.reOhm)) > SUSPECT ? [i] : [];
  });
}
