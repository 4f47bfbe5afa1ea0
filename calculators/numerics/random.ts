/** Seeded random numbers: the same seed gives the same digits everywhere. */
export interface RandomSource {
  /** Uniform in [0, 1), 53 bits. */
  uniform(): number;
  /** Uniform in [low, high). */
  between(low: number, high: number): number;
  /** Log-uniform in [low, high), both > 0. */
  logBetween(low: number, high: number): number;
  /** Whole number in [0, count). */
  below(count: number): number;
  /** Normal deviate, mean 0, standard deviation 1. */
  normal(): number;
}

/**
 * xoshiro128** by D. Blackman and S. Vigna (public domain), its state filled by a splitmix step from the seed; normal deviates by
 * the polar method (G. Marsaglia, T. A. Bray 1964). Both from memory.
 */
export function seededRandom(seed: number): RandomSource {
  const state = new Uint32Array(4);
  let mix = seed >>> 0;
  for (let i = 0; i < 4; i++) {
    mix = (mix + 0x9e3779b9) >>> 0;
    let z = mix;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    state[i] = (z ^ (z >>> 16)) >>> 0;
  }
  if (state.every((word) => word === 0)) state[0] = 1;
  const rotate = (x: number, k: number) => ((x << k) | (x >>> (32 - k))) >>> 0;
  const word = (): number => {
    const [s0, s1, s2, s3] = [state[0]!, state[1]!, state[2]!, state[3]!];
    const result = Math.imul(rotate(Math.imul(s1, 5) >>> 0, 7), 9) >>> 0;
    const c = s2 ^ s0;
    const d = s3 ^ s1;
    state[1] = s1 ^ c;
    state[0] = s0 ^ d;
    state[2] = c ^ (s1 << 9);
    state[3] = rotate(d >>> 0, 11);
    return result;
  };
  let spare: number | null = null;
  const uniform = () => ((word() >>> 5) * 67108864 + (word() >>> 6)) / 9007199254740992;
  const normal = (): number => {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const s = u * u + v * v;
      if (s >= 1 || s === 0) continue;
      const factor = Math.sqrt((-2 * Math.log(s)) / s);
      spare = v * factor;
      return u * factor;
    }
  };
  return {
    uniform,
    between: (low, high) => low + (high - low) * uniform(),
    logBetween: (low, high) => low * (high / low) ** uniform(),
    below: (count) => Math.floor(uniform() * count),
    normal,
  };
}
