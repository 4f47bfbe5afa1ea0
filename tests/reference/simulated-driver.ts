import type { Sweep } from '../../calculators/kit/sweep.js';

/**
 * Drivers made for the tests from first principles, with complex numbers written out here and nothing of the product's
 * models: Z = Re + Zcoil(ω) + Bl²/(jωM + Rms + 1/(jωC(ω)) + Sd²·ρc²/(jωVb)).
 */
export interface Complex {
  readonly re: number;
  readonly im: number;
}
export const complex = (re: number, im = 0): Complex => ({ re, im });
export const plus = (...terms: Complex[]): Complex =>
  terms.reduce((a, b) => complex(a.re + b.re, a.im + b.im), complex(0));
export const times = (a: Complex, b: Complex): Complex => complex(a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re);
export const inverse = (a: Complex): Complex => {
  const square = a.re * a.re + a.im * a.im;
  return complex(a.re / square, -a.im / square);
};
export const parallel = (...terms: Complex[]): Complex => inverse(plus(...terms.map(inverse)));

export interface DriverParts {
  readonly re: number; // Ω
  readonly bl: number; // T·m
  readonly mms: number; // kg
  readonly cms: number; // m/N
  readonly rms: number; // N·s/m
  readonly sd: number; // m²
  /** Coil impedance at ω, without Re. */
  readonly coil: (omega: number) => Complex;
  /** Compliance over cms at ω; 1 if left out. */
  readonly compliance?: (omega: number) => Complex;
}
export interface Load {
  readonly mass?: number; // kg, added
  readonly volume?: number; // m³, sealed box
  readonly stiffnessOfAir?: number; // ρc², Pa
}

export function motionalOf(d: DriverParts, frequencyHz: number, load: Load = {}): Complex {
  const omega = 2 * Math.PI * frequencyHz;
  const compliance = times(complex(d.cms), d.compliance?.(omega) ?? complex(1));
  const air = load.volume
    ? complex(0, (-d.sd * d.sd * (load.stiffnessOfAir ?? 0)) / (omega * load.volume))
    : complex(0);
  const mechanical = plus(
    complex(d.rms, omega * (d.mms + (load.mass ?? 0))),
    inverse(times(complex(0, omega), compliance)),
    air,
  );
  return times(complex(d.bl * d.bl), inverse(mechanical));
}

export function impedanceOf(d: DriverParts, frequencyHz: number, load: Load = {}): Complex {
  return plus(complex(d.re), d.coil(2 * Math.PI * frequencyHz), motionalOf(d, frequencyHz, load));
}

export function logFrequencies(points: number, lowHz: number, highHz: number): Float64Array {
  const step = Math.log(highHz / lowHz) / (points - 1);
  return Float64Array.from({ length: points }, (_, i) => lowHz * Math.exp(i * step));
}

/** A sweep of the driver; `disturb` turns the clean value of point i into what was measured. */
export function sweepOf(
  driver: DriverParts,
  frequencyHz: Float64Array,
  load: Load = {},
  disturb: (clean: Complex, i: number) => Complex = (clean) => clean,
): Sweep {
  const points = Array.from(frequencyHz, (f, i) => disturb(impedanceOf(driver, f, load), i));
  return {
    name: load.mass ? 'with added mass' : load.volume ? 'in the box' : 'free air',
    frequencyHz,
    realOhm: Float64Array.from(points, ({ re }) => re),
    imaginaryOhm: Float64Array.from(points, ({ im }) => im),
    conditions: { role: 'sweep' },
  };
}

/** Uniform numbers in [0, 1), the same for the same seed: the mulberry32 generator (from memory). */
export function seeded(seed: number): () => number {
  let state = (seed * 2654435761) >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Standard normal numbers by the Box–Muller transform. */
export function normals(seed: number): () => number {
  const uniform = seeded(seed);
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** White relative noise, `sigma` for each of the real and imaginary part. */
export function relativeNoise(sigma: number, normal: () => number): (clean: Complex) => Complex {
  return (clean) => times(clean, complex(1 + sigma * normal(), sigma * normal()));
}
