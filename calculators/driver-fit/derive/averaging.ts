import { normalCdf } from '../../numerics/distributions.js';
import type { Cause, Propagated } from './propagation.js';

/** One model's figures with its weight among all models. */
export interface Weighted {
  readonly weight: number;
  readonly propagated: Propagated;
}
/** A figure over all models: the chosen model's value, the spread of the others in its uncertainty. */
export interface Averaged {
  readonly value: number;
  readonly uncertainty: number;
  readonly parts: Readonly<Record<Cause, number>>; // of the chosen model
  readonly spread: number; // √Σw(x − x̄)²: what the choice of the model adds
  readonly interval: { readonly low: number; readonly high: number } | null; // 95 % of the mixture, where it is uneven
}

const EVEN_SPREAD = 0.3; // of the chosen model's uncertainty: below, ± says it all

/**
 * u² = Σ wᵢ·[uᵢ² + (xᵢ − x̄)²] with wᵢ ∝ exp(−ΔBICᵢ/2), x̄ = Σ wᵢxᵢ. Source: K. P. Burnham, D. R. Anderson, "Model
 * Selection and Multimodel Inference" (2002), with weights from BIC (from memory). `stretch`: Student's t over the
 * normal quantile for the degrees of freedom at hand. Figures that only the chosen model has keep its uncertainty.
 */
export function averaged(id: string, models: readonly [Weighted, ...Weighted[]], stretch: number): Averaged | null {
  const [chosen] = models;
  const value = chosen.propagated.values[id];
  const parts = chosen.propagated.parts[id];
  if (typeof value !== 'number') return null;
  const alike = models.flatMap(({ weight, propagated }) => {
    const x = propagated.values[id];
    return typeof x === 'number' ? [{ weight, x, u: propagated.uncertainty[id] ?? 0 }] : [];
  });
  const total = alike.reduce((sum, { weight }) => sum + weight, 0);
  const mean = alike.reduce((sum, { weight, x }) => sum + weight * x, 0) / total;
  const within = alike.reduce((sum, { weight, u }) => sum + weight * u * u, 0) / total;
  const between = alike.reduce((sum, { weight, x }) => sum + weight * (x - mean) ** 2, 0) / total;
  const spread = Math.sqrt(between);
  const own = chosen.propagated.uncertainty[id] ?? 0;
  const none = Object.fromEntries(Object.keys(parts ?? {}).map((cause) => [cause, 0])) as Record<Cause, number>;
  return {
    value,
    uncertainty: Math.sqrt(within + between),
    parts: parts ?? none,
    spread,
    interval: spread > EVEN_SPREAD * own ? mixtureInterval(alike, total, stretch) : null,
  };
}

interface Component {
  readonly weight: number;
  readonly x: number;
  readonly u: number;
}

/** The 2.5 % and 97.5 % quantiles of a mixture of normal distributions, by bisection. */
function mixtureInterval(
  components: readonly Component[],
  total: number,
  stretch: number,
): { low: number; high: number } {
  const below = (at: number): number =>
    components.reduce(
      (sum, { weight, x, u }) => sum + (weight / total) * normalCdf((at - x) / Math.max(u * stretch, Number.MIN_VALUE)),
      0,
    );
  const reach = 8 * Math.max(...components.map(({ u }) => u)) * stretch;
  const [least, most] = [
    Math.min(...components.map(({ x }) => x)) - reach,
    Math.max(...components.map(({ x }) => x)) + reach,
  ];
  const quantileAt = (probability: number): number => {
    let [low, high] = [least, most];
    for (let i = 0; i < 40; i += 1) {
      const middle = (low + high) / 2;
      if (below(middle) < probability) low = middle;
      else high = middle;
    }
    return (low + high) / 2;
  };
  return { low: quantileAt(0.025), high: quantileAt(0.975) };
}
