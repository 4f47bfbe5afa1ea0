import { InputError } from '../../shared/errors.js';
import { magnitudeOf, type Sweep } from '../kit/sweep.js';

const BEYOND = 1e-9; // relative: a frequency written with fewer digits may lie this far outside

/**
 * The sweep at other frequencies: ln |Z| and the unwrapped phase, each interpolated in ln f by piecewise cubics with the slopes of the
 * parabola through three neighbouring points (cubic Hermite interpolation, common practice). Measured points stay as they are.
 * Shapes: frequencyHz (m), in any order; the result is ascending, each frequency once. Error: `bad-setting` for a frequency outside the sweep.
 */
export function resample(sweep: Sweep, frequencyHz: readonly number[]): Sweep {
  const wanted = [...new Set(frequencyHz)].sort((a, b) => a - b);
  const known = sweep.frequencyHz;
  const [least, most] = [known[0] ?? 0, known.at(-1) ?? 0];
  const outside = wanted.find((f) => !(f >= least * (1 - BEYOND) && f <= most * (1 + BEYOND)));
  if (outside !== undefined) {
    const message = `The sweep reaches from ${least} to ${most} Hz; ${outside} Hz lies outside. Ask for frequencies inside.`;
    throw new InputError('bad-setting', message, 'frequencies');
  }
  const lnF = known.map(Math.log);
  const target = Float64Array.from(wanted, Math.log);
  const size = interpolated(lnF, magnitudeOf(sweep).map(Math.log), target).map(Math.exp);
  const plain = { name: sweep.name, conditions: sweep.conditions, frequencyHz: Float64Array.from(wanted) };
  const { realOhm, imaginaryOhm } = sweep;
  if (!realOhm || !imaginaryOhm) return { ...plain, magnitudeOhm: kept(known, wanted, magnitudeOf(sweep), size) };
  const phase = interpolated(lnF, unwrapped(realOhm, imaginaryOhm), target);
  const real = size.map((value, i) => value * Math.cos(phase[i]!));
  const imaginary = size.map((value, i) => value * Math.sin(phase[i]!));
  return {
    ...plain,
    realOhm: kept(known, wanted, realOhm, real),
    imaginaryOhm: kept(known, wanted, imaginaryOhm, imaginary),
  };
}

/** Radians, shape (n): neighbours at most half a turn apart. */
function unwrapped(re: Float64Array, im: Float64Array): Float64Array {
  let before = 0;
  return re.map((value, i) => {
    const angle = Math.atan2(im[i]!, value);
    before = i === 0 ? angle : angle - 2 * Math.PI * Math.round((angle - before) / (2 * Math.PI));
    return before;
  });
}

/** The measured value itself where a measured frequency is asked for. */
function kept(
  known: Float64Array,
  wanted: readonly number[],
  measured: Float64Array,
  computed: Float64Array,
): Float64Array {
  let k = 0;
  return computed.map((value, i) => {
    while (k < known.length && known[k]! < wanted[i]!) k += 1;
    return known[k] === wanted[i] ? measured[k]! : value;
  });
}

/** Piecewise cubic through (x, y), x ascending, shape (n), n ≥ 3; at `targets`, ascending, held at the ends. */
function interpolated(x: Float64Array, y: Float64Array, targets: Float64Array): Float64Array {
  const slope = slopes(x, y);
  let k = 0;
  return targets.map((target) => {
    const at = Math.min(Math.max(target, x[0]!), x.at(-1)!);
    while (k < x.length - 2 && x[k + 1]! < at) k += 1;
    const width = x[k + 1]! - x[k]!;
    const t = (at - x[k]!) / width;
    const [t2, t3] = [t * t, t * t * t];
    return (
      y[k]! * (2 * t3 - 3 * t2 + 1) +
      y[k + 1]! * (3 * t2 - 2 * t3) +
      width * (slope[k]! * (t3 - 2 * t2 + t) + slope[k + 1]! * (t3 - t2))
    );
  });
}

/** The slope at each point of the parabola through it and its two neighbours; at the ends of the outermost one. */
function slopes(x: Float64Array, y: Float64Array): Float64Array {
  const n = x.length;
  return x.map((at, i) => {
    const m = Math.min(Math.max(i, 1), n - 2);
    const left = (y[m]! - y[m - 1]!) / (x[m]! - x[m - 1]!);
    const right = (y[m + 1]! - y[m]!) / (x[m + 1]! - x[m]!);
    const bend = (right - left) / (x[m + 1]! - x[m - 1]!);
    return left + bend * (2 * at - x[m - 1]! - x[m]!);
  });
}
