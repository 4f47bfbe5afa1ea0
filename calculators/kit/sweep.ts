import type { SweepConditions } from '../../shared/contracts/sweep.js';
import { InputError } from '../../shared/errors.js';

/**
 * One impedance measurement over frequency. Never changed in place.
 * Shapes: every array (n); frequencyHz ascending, > 0, unique. Either realOhm and imaginaryOhm are present, or
 * magnitudeOhm stands alone (no phase known).
 */
export interface Sweep {
  readonly name: string;
  readonly frequencyHz: Float64Array;
  readonly realOhm?: Float64Array;
  readonly imaginaryOhm?: Float64Array;
  readonly magnitudeOhm?: Float64Array;
  readonly conditions: SweepConditions;
}
export interface ComplexSweep extends Sweep {
  readonly realOhm: Float64Array;
  readonly imaginaryOhm: Float64Array;
}

export function hasPhase(sweep: Sweep): sweep is ComplexSweep {
  return sweep.realOhm !== undefined && sweep.imaginaryOhm !== undefined;
}

/** |Z| in ohm, shape (n): computed from the parts, or as measured when only the magnitude is known. */
export function magnitudeOf(sweep: Sweep): Float64Array {
  if (sweep.magnitudeOhm) return sweep.magnitudeOhm;
  const { realOhm, imaginaryOhm } = sweep;
  if (!realOhm || !imaginaryOhm) throw new InputError('no-numeric-data', 'The sweep holds no impedance.', sweep.name);
  return realOhm.map((re, i) => Math.hypot(re, imaginaryOhm[i] ?? 0));
}
