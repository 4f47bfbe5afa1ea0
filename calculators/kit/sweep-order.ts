import { InputError } from '../../shared/errors.js';
import type { Sweep } from './sweep.js';

export const LEAST_POINTS = 8;

/**
 * The sweep as every calculator may count on it: rows by rising frequency, rows of one frequency averaged, at least
 * eight of them, every number finite, frequencies and magnitudes above 0. Returned as it is where it already is so.
 * Errors: InputError not-a-curve, negative-frequency, zero-impedance, single-frequency, too-few-points.
 */
export function inOrder(sweep: Sweep): Sweep {
  checkNumbers(sweep);
  if (isRising(sweep.frequencyHz)) return enoughPoints(sweep);
  const order = Array.from(sweep.frequencyHz.keys()).sort(
    (a, b) => (sweep.frequencyHz[a] ?? 0) - (sweep.frequencyHz[b] ?? 0),
  );
  const groups: number[][] = [];
  for (const row of order) {
    const last = groups.at(-1);
    const isSame = last?.[0] !== undefined && sweep.frequencyHz[last[0]] === sweep.frequencyHz[row];
    if (isSame) last.push(row);
    else groups.push([row]);
  }
  const averaged = (values: Float64Array): Float64Array =>
    Float64Array.from(groups, (rows) => rows.reduce((sum, row) => sum + (values[row] ?? 0), 0) / rows.length);
  return enoughPoints({
    ...sweep,
    frequencyHz: averaged(sweep.frequencyHz),
    ...(sweep.realOhm ? { realOhm: averaged(sweep.realOhm) } : {}),
    ...(sweep.imaginaryOhm ? { imaginaryOhm: averaged(sweep.imaginaryOhm) } : {}),
    ...(sweep.magnitudeOhm ? { magnitudeOhm: averaged(sweep.magnitudeOhm) } : {}),
  });
}

function checkNumbers({ name, frequencyHz, realOhm, imaginaryOhm, magnitudeOhm }: Sweep): void {
  const curves = [realOhm, imaginaryOhm, magnitudeOhm].filter((curve) => curve !== undefined);
  const isWhole = (realOhm && imaginaryOhm) || (magnitudeOhm && !realOhm && !imaginaryOhm);
  if (!isWhole || curves.some((curve) => curve.length !== frequencyHz.length)) {
    throw new InputError('not-a-curve', `${name} does not hold one impedance for each frequency.`, name);
  }
  for (let i = 0; i < frequencyHz.length; i += 1) {
    const f = frequencyHz[i] ?? Number.NaN;
    const z = magnitudeOhm ? (magnitudeOhm[i] ?? Number.NaN) : Math.hypot(realOhm?.[i] ?? 0, imaginaryOhm?.[i] ?? 0);
    const where = `${name}, row ${i + 1}`;
    if (!Number.isFinite(f) || !Number.isFinite(z)) {
      throw new InputError('not-a-curve', `${where} holds something that is not a number. Take the row out.`, where);
    }
    if (f <= 0)
      throw new InputError('negative-frequency', `${where} has a frequency of ${f} Hz. It has to be above 0.`, where);
    if (z <= 0)
      throw new InputError('zero-impedance', `${where} has an impedance of ${z} Ω. It has to be above 0.`, where);
  }
}

function enoughPoints(sweep: Sweep): Sweep {
  const { length } = sweep.frequencyHz;
  if (length === 1) {
    throw new InputError('single-frequency', `${sweep.name} holds one frequency only. A curve is needed.`, sweep.name);
  }
  if (length >= LEAST_POINTS) return sweep;
  const message = `${sweep.name} has ${length} points; at least ${LEAST_POINTS} are needed.`;
  throw new InputError('too-few-points', message, sweep.name);
}

function isRising(frequencyHz: Float64Array): boolean {
  for (let i = 1; i < frequencyHz.length; i += 1) {
    if ((frequencyHz[i] ?? 0) <= (frequencyHz[i - 1] ?? 0)) return false;
  }
  return true;
}
