/**
 * Robust losses in the form cost = ½ C² Σ ρ(z), z = |r|²/C² for each group of rows, C the scale.
 * linear ρ = z · soft-l1 ρ = 2(√(1 + z) − 1) · huber ρ = z up to 1, then 2√z − 1 · cauchy ρ = ln(1 + z).
 * Source: common practice in robust regression (Huber, "Robust Statistics", 1981; the rest from memory).
 */
export const LOSS_KINDS = ['linear', 'soft-l1', 'huber', 'cauchy'] as const;
export type LossKind = (typeof LOSS_KINDS)[number];

export interface Loss {
  readonly kind: LossKind;
  readonly scale: number; // C, in units of the residual
}
export const LINEAR_LOSS: Loss = { kind: 'linear', scale: 1 };

/** ρ(z). */
export function lossValue(kind: LossKind, z: number): number {
  if (kind === 'linear') return z;
  if (kind === 'soft-l1') return (2 * z) / (1 + Math.sqrt(1 + z)); // = 2(√(1 + z) − 1) without cancellation
  if (kind === 'cauchy') return Math.log1p(z);
  return z <= 1 ? z : 2 * Math.sqrt(z) - 1;
}

/** ρ′(z), the weight of a group in the normal equations. */
export function lossWeight(kind: LossKind, z: number): number {
  if (kind === 'linear') return 1;
  if (kind === 'soft-l1') return 1 / Math.sqrt(1 + z);
  if (kind === 'cauchy') return 1 / (1 + z);
  return z <= 1 ? 1 : 1 / Math.sqrt(z);
}
