/**
 * A sweep as the chart reads it. Shapes: every array (n); frequencyHz ascending and above 0. Either the parts are
 * present, or the magnitude alone. A sweep of the calculators fits as it is.
 */
export interface ImpedancePoints {
  readonly frequencyHz: Float64Array;
  readonly realOhm?: Float64Array | undefined;
  readonly imaginaryOhm?: Float64Array | undefined;
  readonly magnitudeOhm?: Float64Array | undefined;
}
export type Quantity = 'magnitude' | 'phase' | 'real' | 'imaginary';

/** Everything that is drawn, worked out once per sweep and kept: logarithms are dearer than a frame allows. */
export interface CurveColumns {
  readonly frequencyHz: Float64Array;
  readonly lnFrequency: Float64Array;
  readonly magnitudeOhm: Float64Array;
  readonly lnMagnitude: Float64Array;
  readonly phaseDeg: Float64Array | undefined; // −180 to 180
  readonly unwrappedDeg: Float64Array | undefined; // without jumps of a whole turn
  readonly realOhm: Float64Array | undefined;
  readonly imaginaryOhm: Float64Array | undefined;
}

const kept = new WeakMap<ImpedancePoints, CurveColumns>();

export function columnsOf(points: ImpedancePoints): CurveColumns {
  const known = kept.get(points);
  if (known) return known;
  const { frequencyHz, realOhm, imaginaryOhm } = points;
  const magnitudeOhm =
    realOhm && imaginaryOhm
      ? realOhm.map((re, i) => Math.hypot(re, imaginaryOhm[i] ?? 0))
      : (points.magnitudeOhm ?? new Float64Array(frequencyHz.length).fill(Number.NaN));
  const phaseDeg =
    realOhm && imaginaryOhm
      ? realOhm.map((re, i) => (Math.atan2(imaginaryOhm[i] ?? 0, re) * 180) / Math.PI)
      : undefined;
  const columns: CurveColumns = {
    frequencyHz,
    lnFrequency: frequencyHz.map(Math.log),
    magnitudeOhm,
    lnMagnitude: magnitudeOhm.map((value) => (value > 0 ? Math.log(value) : Number.NaN)),
    phaseDeg,
    unwrappedDeg: phaseDeg && unwrapped(phaseDeg),
    realOhm: phaseDeg && realOhm,
    imaginaryOhm: phaseDeg && imaginaryOhm,
  };
  kept.set(points, columns);
  return columns;
}

function unwrapped(phaseDeg: Float64Array): Float64Array {
  let turns = 0;
  return phaseDeg.map((value, i) => {
    const step = i > 0 ? value - (phaseDeg[i - 1] ?? value) : 0;
    if (step > 180) turns -= 1;
    else if (step < -180) turns += 1;
    return value + 360 * turns;
  });
}

/** The column of a quantity, undefined where the sweep has no phase. */
export function columnOf(columns: CurveColumns, quantity: Quantity, isUnwrapped = false): Float64Array | undefined {
  switch (quantity) {
    case 'magnitude':
      return columns.magnitudeOhm;
    case 'phase':
      return isUnwrapped ? columns.unwrappedDeg : columns.phaseDeg;
    case 'real':
      return columns.realOhm;
    case 'imaginary':
      return columns.imaginaryOhm;
  }
}

/** Least index with values[i] >= target, values ascending; length where there is none. */
export function firstAtLeast(values: Float64Array, target: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((values[middle] ?? Number.POSITIVE_INFINITY) < target) low = middle + 1;
    else high = middle;
  }
  return low;
}
/** The point nearest to a frequency, by ratio. */
export function nearestPoint({ frequencyHz }: Pick<CurveColumns, 'frequencyHz'>, targetHz: number): number {
  const right = Math.min(frequencyHz.length - 1, firstAtLeast(frequencyHz, targetHz));
  const left = Math.max(0, right - 1);
  const toRight = (frequencyHz[right] ?? targetHz) / targetHz;
  const toLeft = targetHz / (frequencyHz[left] ?? targetHz);
  return toLeft <= toRight || toRight < 1 ? (toRight < 1 ? right : left) : right;
}
/** Least and most of the finite values, null where there are none. */
export function extentOf(values: Float64Array, leaveOut?: Uint8Array): [number, number] | null {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i] ?? Number.NaN;
    if (leaveOut?.[i] || !Number.isFinite(value)) continue;
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return least <= most ? [least, most] : null;
}
