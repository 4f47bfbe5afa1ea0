import type { ModelChoice } from './candidates.js';
import { type JointSetup, type JointShape, jointCandidate, valuesById } from './joint-fit.js';
import type { DriverFitSettings } from './settings.js';
import type { SingleFit } from './single-fit.js';

const RE_LIMIT = 0.02; // common practice: more is a warm coil or a bad contact
const CLEARLY_BETTER = 10; // of BIC
const LEAST_MASS_CHANGE = 0.02; // of Mms
export const LEAKY_BELOW = 20; // QL: sound test boxes reach 30 and more (common practice)

/** Which sweeps have a resistance that differs from free air by more than 2 % and by more than chance. */
export function hasOtherRe(singles: readonly SingleFit[]): boolean[] {
  const [free] = singles;
  return singles.map((single) => {
    if (!free || single === free) return false;
    const change = Math.abs(Math.log(single.reOhm / free.reOhm));
    return change > RE_LIMIT && change > 3 * Math.hypot(single.relative.re, free.relative.re);
  });
}

/**
 * What the test box needs beside its volume: a leak, a moving mass of its own (another air load, or something moved),
 * each only where the joint fit is clearly better with it. Which mass is taken can be settled by a setting.
 */
export function boxShape(
  choice: ModelChoice,
  setup: JointSetup,
  freeAir: Readonly<Record<string, number>>,
  { boxMass }: DriverFitSettings,
  checkpoint: () => void,
): JointShape {
  const box = setup.sweeps.findIndex(({ measured }) => measured.role === 'known-volume');
  if (box < 0) return setup.shape;
  const rows = setup.sweeps.reduce((sum, { rows: { data } }) => sum + (data.hasPhase ? 2 : 1) * data.re.length, 0);
  const tried = (shape: JointShape) => {
    const candidate = jointCandidate(choice, { ...setup, shape }, freeAir, checkpoint);
    const bic = rows * Math.log(candidate.squares / rows) + candidate.freeParameters * Math.log(rows);
    return { shape, bic, values: valuesById(candidate.problem, candidate.fit) };
  };
  const isFree = boxMass === 'unequal';
  let best = tried({ ...setup.shape, isBoxMassFree: isFree });
  const leaky = tried({ ...best.shape, boxKind: 'leaky' });
  if (leaky.bic < best.bic - CLEARLY_BETTER && (leaky.values[`QL${box + 1}`] ?? 0) < LEAKY_BELOW) best = leaky;
  if (boxMass === 'auto') {
    const unequal = tried({ ...best.shape, isBoxMassFree: true });
    const change = Math.abs(unequal.values[`mu${box + 1}`] ?? 0);
    if (unequal.bic < best.bic - CLEARLY_BETTER && change > LEAST_MASS_CHANGE) best = unequal;
  }
  return best.shape;
}
