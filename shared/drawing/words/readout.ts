import { type CurveColumns, columnsOf, firstAtLeast, type ImpedancePoints } from '../curves/columns.js';

/** What a curve says at one frequency. `isMeasured` is false between two points. */
export interface ReadoutValue {
  readonly frequencyHz: number;
  readonly magnitudeOhm: number;
  readonly phaseDeg: number | undefined;
  readonly realOhm: number | undefined;
  readonly imaginaryOhm: number | undefined;
  readonly isMeasured: boolean;
}
export interface CursorReadout {
  readonly a: ReadoutValue | null; // null: not set, or outside the sweep
  readonly b: ReadoutValue | null;
  readonly difference: {
    readonly frequencyHz: number;
    readonly magnitudeOhm: number;
    readonly phaseDeg?: number;
  } | null;
  readonly ratio: { readonly frequency: number; readonly magnitude: number } | null; // B ÷ A
}

const SAME = 1e-12; // relative: a stored frequency comes back as it was

/**
 * The drawn line at `frequencyHz`: ln |Z| and phase go straight over ln f between the two nearest points; at a point,
 * the measured values themselves. Null outside the sweep.
 */
export function valueOfCurve(points: ImpedancePoints, frequencyHz: number): ReadoutValue | null {
  const columns = columnsOf(points);
  const { frequencyHz: all } = columns;
  const right = firstAtLeast(all, frequencyHz * (1 - SAME));
  const rightHz = all[right];
  if (rightHz === undefined) return null;
  if (Math.abs(rightHz - frequencyHz) <= SAME * frequencyHz) return pointValue(columns, right);
  if (right === 0) return null;
  const left = right - 1;
  const x0 = columns.lnFrequency[left] ?? 0;
  const part = (Math.log(frequencyHz) - x0) / ((columns.lnFrequency[right] ?? 1) - x0);
  const mix = (a: number, b: number) => a + (b - a) * part;
  const magnitudeOhm = Math.exp(mix(columns.lnMagnitude[left] ?? 0, columns.lnMagnitude[right] ?? 0));
  const { phaseDeg } = columns;
  const phase = phaseDeg && inTurn(mix(phaseDeg[left] ?? 0, (phaseDeg[left] ?? 0) + step(phaseDeg, left)));
  const radians = phase === undefined ? undefined : (phase * Math.PI) / 180;
  return {
    frequencyHz,
    magnitudeOhm,
    phaseDeg: phase,
    realOhm: radians === undefined ? undefined : magnitudeOhm * Math.cos(radians),
    imaginaryOhm: radians === undefined ? undefined : magnitudeOhm * Math.sin(radians),
    isMeasured: false,
  };
}
const step = (phase: Float64Array, left: number): number => inTurn((phase[left + 1] ?? 0) - (phase[left] ?? 0));
/** Into −180 … 180, as atan2 gives it. */
const inTurn = (deg: number): number => (deg > 180 ? deg - 360 : deg < -180 ? deg + 360 : deg);

function pointValue(columns: CurveColumns, index: number): ReadoutValue {
  return {
    frequencyHz: columns.frequencyHz[index] ?? Number.NaN,
    magnitudeOhm: columns.magnitudeOhm[index] ?? Number.NaN,
    phaseDeg: columns.phaseDeg?.[index],
    realOhm: columns.realOhm?.[index],
    imaginaryOhm: columns.imaginaryOhm?.[index],
    isMeasured: true,
  };
}

/** Values at both cursors, B − A and B ÷ A. */
export function cursorReadout(points: ImpedancePoints, aHz: number | null, bHz: number | null): CursorReadout {
  const a = aHz === null ? null : valueOfCurve(points, aHz);
  const b = bHz === null ? null : valueOfCurve(points, bHz);
  if (!a || !b) return { a, b, difference: null, ratio: null };
  const frequencyHz = b.frequencyHz - a.frequencyHz;
  const magnitudeOhm = b.magnitudeOhm - a.magnitudeOhm;
  const both = a.phaseDeg !== undefined && b.phaseDeg !== undefined;
  return {
    a,
    b,
    difference: both
      ? { frequencyHz, magnitudeOhm, phaseDeg: (b.phaseDeg ?? 0) - (a.phaseDeg ?? 0) }
      : { frequencyHz, magnitudeOhm },
    ratio: { frequency: b.frequencyHz / a.frequencyHz, magnitude: b.magnitudeOhm / a.magnitudeOhm },
  };
}
