/**
 * The canonical form of a sweep's points: planar little-endian float64, first every frequency (Hz, ascending), then
 * every real and every imaginary part (ohm), or, where no phase is known, every magnitude (ohm). The sha-256 of these
 * bytes is the sweep's identity in a result, so the form never changes.
 */
export interface Points {
  readonly frequencyHz: Float64Array;
  readonly realOhm?: Float64Array | undefined;
  readonly imaginaryOhm?: Float64Array | undefined;
  readonly magnitudeOhm?: Float64Array | undefined;
}

const BYTES_A_NUMBER = 8;

export function planesOf(points: Points): Float64Array[] {
  const { frequencyHz, realOhm, imaginaryOhm, magnitudeOhm } = points;
  if (realOhm && imaginaryOhm) return [frequencyHz, realOhm, imaginaryOhm];
  if (magnitudeOhm) return [frequencyHz, magnitudeOhm];
  throw new RangeError('points hold neither both parts nor a magnitude');
}

/** Bytes of the canonical form: 24 a point with phase, 16 without. */
export function encodePoints(points: Points): Uint8Array<ArrayBuffer> {
  const planes = planesOf(points);
  const n = points.frequencyHz.length;
  if (planes.some((plane) => plane.length !== n)) throw new RangeError('planes of different lengths');
  const view = new DataView(new ArrayBuffer(planes.length * n * BYTES_A_NUMBER));
  planes.forEach((plane, p) => {
    plane.forEach((value, i) => {
      view.setFloat64((p * n + i) * BYTES_A_NUMBER, value === 0 ? 0 : value, true); // −0 is written as 0
    });
  });
  return new Uint8Array(view.buffer);
}

/** The reverse of `encodePoints`; `n` and `hasPhase` stand in the sweep's revision. Throws RangeError on a wrong size. */
export function decodePoints(bytes: Uint8Array, n: number, hasPhase: boolean): Points {
  const planes = hasPhase ? 3 : 2;
  if (bytes.byteLength !== planes * n * BYTES_A_NUMBER) throw new RangeError('points of an unexpected size');
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const plane = (p: number) => Float64Array.from({ length: n }, (_, i) => view.getFloat64((p * n + i) * 8, true));
  const frequencyHz = plane(0);
  return hasPhase
    ? { frequencyHz, realOhm: plane(1), imaginaryOhm: plane(2) }
    : { frequencyHz, magnitudeOhm: plane(1) };
}
