import {
  type Complex,
  complex,
  type DriverParts,
  inverse,
  motionalOf,
  normals,
  parallel,
  plus,
  seeded,
  sweepOf,
  times,
} from './simulated-driver.js';

/**
 * Twelve drivers that no model of the product describes: coils as ladders of five or six R–L sections, a suspension that
 * creeps logarithmically and relaxes at once, noise correlated along frequency, and a slow drift of Re while the sweep runs.
 */
export interface OutOfFamilyDriver {
  readonly name: string;
  readonly parts: DriverParts;
  readonly addedMassKg: number;
  readonly noise: number; // relative, one component
  readonly correlation: number; // of neighbouring points
  readonly drift: number; // of Re from one end of the sweep to the other
}

export const AIR = { density: 1.2041, speedOfSound: 343.21 } as const;

/** Uniform and log-uniform draws, the same for the same driver. */
export function outOfFamilyDrivers(): OutOfFamilyDriver[] {
  return Array.from({ length: 12 }, (_, i) => driverNumber(i + 1));
}

function driverNumber(number: number): OutOfFamilyDriver {
  const draw = seeded(7_000 + number);
  const between = (low: number, high: number): number => low + (high - low) * draw();
  const logBetween = (low: number, high: number): number => low * (high / low) ** draw();
  const fs = logBetween(20, 120);
  const re = logBetween(3, 11);
  const sd = 0.02 * (45 / fs) ** 1.3 * logBetween(0.7, 1.4);
  const mms = 0.02 * (sd / 0.015) ** 1.3 * logBetween(0.8, 1.3);
  const omega = 2 * Math.PI * fs;
  const cms = 1 / (omega * omega * mms);
  const qms = logBetween(2.5, 9);
  const qes = logBetween(0.25, 0.9);
  return {
    name: `ladder ${number}`,
    parts: {
      re,
      bl: Math.sqrt((omega * mms * re) / qes),
      mms,
      cms,
      rms: (omega * mms) / qms,
      sd,
      coil: ladder(number % 2 ? 5 : 6, re, logBetween(0.04, 0.12), draw),
      compliance: mixedCreep(omega, between(0, 0.05), between(0, 0.12), logBetween(0.1, 0.8)),
    },
    addedMassKg: mms * between(0.4, 1),
    noise: logBetween(0.001, 0.006),
    correlation: between(0.3, 0.8),
    drift: between(-0.01, 0.01),
  };
}

/** Each section shunts a series inductance by the rest of the ladder beside a resistance: Z = jωL1 + R1 ∥ (jωL2 + R2 ∥ … jωLn). */
function ladder(sections: number, re: number, perOhm: number, draw: () => number): (omega: number) => Complex {
  const spread = 2.2 + 1.2 * draw();
  const rows = Array.from({ length: sections }, (_, k) => ({
    henry: perOhm * 1e-3 * re * 0.35 * spread ** (k * 0.55) * (0.8 + 0.4 * draw()),
    ohm: re * 3.2 * spread ** (-k * 0.6) * (0.8 + 0.4 * draw()),
  }));
  return (omega) =>
    rows.reduceRight((rest, { henry, ohm }, k) => {
      const inner = k === sections - 1 ? complex(0) : parallel(complex(ohm), rest);
      return plus(complex(0, omega * henry), inner);
    }, complex(0));
}

/** C/C0 = 1 − λ·lg(jω/ωs) + κ/(1 + jωτ). */
function mixedCreep(omegaS: number, lambda: number, kappa: number, ratio: number): (omega: number) => Complex {
  const tau = 1 / (ratio * omegaS);
  return (omega) =>
    plus(
      complex(1 - lambda * Math.log10(omega / omegaS), (-lambda * Math.PI) / (2 * Math.LN10)),
      times(complex(kappa), inverse(complex(1, omega * tau))),
    );
}

/** Noise that each point partly hands on to the next, on top of a Re that drifts evenly in ln f. */
export function disturbedSweep(driver: OutOfFamilyDriver, frequencyHz: Float64Array, seed: number, massKg = 0) {
  const normal = normals(seed);
  const { correlation, noise, drift, parts } = driver;
  const fresh = noise * Math.sqrt(1 - correlation * correlation);
  let [re, im] = [noise * normal(), noise * normal()];
  return sweepOf(parts, frequencyHz, massKg ? { mass: massKg } : {}, (clean, i) => {
    re = correlation * re + fresh * normal();
    im = correlation * im + fresh * normal();
    const drifted = plus(clean, complex(parts.re * drift * (i / frequencyHz.length - 0.5)));
    return times(drifted, complex(1 + re, im));
  });
}

/** |Re + motional impedance|, noise-free and without the coil. */
export function motionalMagnitude(driver: OutOfFamilyDriver, frequencyHz: Float64Array, massKg = 0): Float64Array {
  return frequencyHz.map((f) => {
    const { re, im } = motionalOf(driver.parts, f, massKg ? { mass: massKg } : {});
    return Math.hypot(driver.parts.re + re, im);
  });
}
