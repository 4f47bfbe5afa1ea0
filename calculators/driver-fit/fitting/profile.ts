import { leastSquares } from '../../numerics/least-squares.js';
import type { LeastSquaresProblem } from '../../numerics/least-squares-problem.js';
import type { Outcome } from './analysis.js';

/** Ends of a 95 % interval of one parameter; null where the data set no end on that side. */
export interface ProfileInterval {
  readonly low: number | null;
  readonly high: number | null;
}

const TWO_SIDED = 3.841; // 95 % point of χ² with one degree of freedom: 2Δ ln L
const ONE_SIDED = 2.706; // 90 % point: 95 % on one side
const LARGEST_FACTOR = 1e6; // beyond it from the start there is no end
const BISECTIONS = 7; // of the last factor of 4: within 1 %

/**
 * Likelihood profile of one fitted parameter: held at a value, all others refitted, until −2 ln L has grown by 3.84
 * (2.71 where only one side can be bounded). Source: common practice; W. Q. Meeker, L. A. Escobar, "Teaching about
 * Approximate Confidence Regions Based on Maximum Likelihood Estimation", Am. Statist. 49 (1995) (from memory).
 * `from` is a value > 0 inside the interval to begin at; a side of `sides` that is not asked for stays null.
 */
export function profileInterval(
  { problem, fit }: Outcome,
  id: string,
  from: number,
  sides: readonly ('low' | 'high')[],
  checkpoint: () => void,
): ProfileInterval {
  const k = problem.indexOf(id);
  const limit = sides.length === 2 ? TWO_SIDED : ONE_SIDED;
  let start = Float64Array.from(fit.values);
  const excess = (value: number): number => {
    const held: LeastSquaresProblem = {
      ...problem,
      parameters: problem.parameters.map((parameter, i) =>
        i === k ? { ...parameter, lower: Number.MIN_VALUE, upper: Number.MAX_VALUE, held: true } : parameter,
      ),
    };
    const at = start.slice();
    at[k] = value;
    const refit = leastSquares(held, at, {
      relativeOffset: 1e-2,
      maxIterations: 30,
      covariance: false,
      absoluteSigma: true,
      checkpoint,
    });
    if (Number.isFinite(refit.cost)) start = Float64Array.from(refit.values);
    return 2 * (refit.cost - fit.cost);
  };
  const end = (direction: 1 | -1): number | null => {
    start = Float64Array.from(fit.values);
    let inside = from;
    let outside = from;
    do {
      inside = outside;
      outside = inside * 4 ** direction;
      if (Math.abs(Math.log(outside / from)) > Math.log(LARGEST_FACTOR)) return null;
    } while (!(excess(outside) > limit));
    for (let i = 0; i < BISECTIONS; i += 1) {
      const middle = Math.sqrt(inside * outside);
      if (excess(middle) > limit) outside = middle;
      else inside = middle;
    }
    return Math.sqrt(inside * outside);
  };
  return { low: sides.includes('low') ? end(-1) : null, high: sides.includes('high') ? end(1) : null };
}
