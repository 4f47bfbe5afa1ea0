import type { FitParameter } from '../numerics/least-squares-problem.js';

/**
 * Compliance of the suspension relative to Cms, c(jω), x = f/fs:
 * constant  c = 1
 * creep     c = 1 − λ·log10(jx). M. H. Knudsen, J. G. Jensen, "Low-Frequency Loudspeaker Models That Include Suspension
 *           Creep", J. Audio Eng. Soc. 41, 1993, p. 3 (formula from memory)
 * relaxing  c = 1 + κ/(1 + jωτ): three-parameter solid, Cms of the quick spring alone (common practice in viscoelasticity)
 */
export const SUSPENSION_MODELS = ['constant', 'creep', 'relaxing'] as const;
export type SuspensionModel = (typeof SUSPENSION_MODELS)[number];

/** `lambda` and `kappa` are pure numbers, `tau` in s. */
const PARAMETERS: Readonly<Record<SuspensionModel, readonly FitParameter[]>> = {
  constant: [],
  creep: [{ id: 'lambda', lower: 0, upper: 0.7, maxStep: 0.15, typical: 0.1 }],
  relaxing: [
    { id: 'kappa', logScaled: true, lower: 1e-4, upper: 30 },
    { id: 'tau', logScaled: true, lower: 1e-6, upper: 10 },
  ],
};

export function suspensionParameters(model: SuspensionModel): readonly FitParameter[] {
  return PARAMETERS[model];
}

/** c(jω) at one frequency: [Re c, Im c]. `values` holds the suspension's parameters from index `at` on. */
export function relativeCompliance(
  model: SuspensionModel,
  values: ArrayLike<number>,
  at: number,
  frequencyHz: number,
  fsHz: number,
): [number, number] {
  if (model === 'constant') return [1, 0];
  if (model === 'creep') {
    const lambda = values[at]!;
    return [1 - lambda * Math.log10(frequencyHz / fsHz), (-lambda * Math.PI) / (2 * Math.LN10)];
  }
  const kappa = values[at]!;
  const wt = 2 * Math.PI * frequencyHz * values[at + 1]!;
  const size = kappa / (1 + wt * wt);
  return [1 + size, -size * wt];
}
