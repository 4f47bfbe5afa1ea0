/** n complex numbers as two planes, so that kernels run over plain doubles. */
export interface ComplexArray {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export function complexArray(n: number): ComplexArray {
  return { re: new Float64Array(n), im: new Float64Array(n) };
}

/** |z|, shape (n). */
export function magnitudes({ re, im }: ComplexArray): Float64Array {
  return re.map((value, i) => Math.hypot(value, im[i]!));
}

/** arg z in rad, −π to π, shape (n). */
export function phasesRad({ re, im }: ComplexArray): Float64Array {
  return re.map((value, i) => Math.atan2(im[i]!, value));
}

/** The same phase without jumps of more than half a turn between neighbours, rad, shape (n). */
export function unwrapped(phaseRad: ArrayLike<number>): Float64Array {
  const out = Float64Array.from(phaseRad);
  for (let i = 1; i < out.length; i++) {
    const jump = out[i]! - out[i - 1]!;
    out[i]! -= 2 * Math.PI * Math.round(jump / (2 * Math.PI));
  }
  return out;
}
