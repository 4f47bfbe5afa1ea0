import type { Points } from '../../shared/points.js';
import { text } from '../../shared/text.js';

/**
 * An invented mid-woofer for the first screen and for trying the product without files of one's own. Its impedance is
 * that of the usual equivalent circuit: Re in series with an inductance beside a resistance (the coil) and with a
 * resonance of quality Qms. Common practice, no published source. The noise comes from a fixed seed.
 */
const SAMPLE = { reOhm: 5.6, fsHz: 46.5, qms: 4.2, resOhm: 38, l1Henry: 0.35e-3, l2Henry: 0.5e-3, r2Ohm: 9 };
const MOVING_MASS_KG = 0.0142;
export const SAMPLE_ADDED_MASS_KG = 0.012;
export const SAMPLE_PISTON_DIAMETER_M = 0.132; // mid-surround to mid-surround
const POINTS = 600;
const LOWEST_HZ = 10;
const HIGHEST_HZ = 20_000;
const NOISE = 0.002; // relative, rms of each part

/** Evenly spread numbers in (0, 1) from a seed: Lehmer's generator, multiplier 48271 modulo 2^31 − 1. */
function uniform(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647;
  };
}
/** Sums of twelve evenly spread numbers less six: near enough to a normal deviate for a picture. */
function normal(next: () => number): number {
  let sum = -6;
  for (let i = 0; i < 12; i += 1) sum += next();
  return sum;
}

export function samplePoints(
  addedMassKg = 0,
  seed = 1,
): Required<Pick<Points, 'frequencyHz' | 'realOhm' | 'imaginaryOhm'>> {
  const { reOhm, resOhm, l1Henry, l2Henry, r2Ohm } = SAMPLE;
  const slower = Math.sqrt(1 + addedMassKg / MOVING_MASS_KG); // fs falls, Qms rises with the root of the mass
  const fsHz = SAMPLE.fsHz / slower;
  const qms = SAMPLE.qms * slower;
  const next = uniform(seed);
  const frequencyHz = Float64Array.from(
    { length: POINTS },
    (_, i) => LOWEST_HZ * (HIGHEST_HZ / LOWEST_HZ) ** (i / (POINTS - 1)),
  );
  const realOhm = new Float64Array(POINTS);
  const imaginaryOhm = new Float64Array(POINTS);
  frequencyHz.forEach((f, i) => {
    const omega = 2 * Math.PI * f;
    const detuning = qms * (f / fsHz - fsHz / f);
    const share = (omega * l2Henry) / r2Ohm;
    const re = reOhm + resOhm / (1 + detuning ** 2) + (r2Ohm * share ** 2) / (1 + share ** 2);
    const im = omega * l1Henry - (resOhm * detuning) / (1 + detuning ** 2) + (r2Ohm * share) / (1 + share ** 2);
    const size = Math.hypot(re, im) * NOISE;
    realOhm[i] = re + size * normal(next);
    imaginaryOhm[i] = im + size * normal(next);
  });
  return { frequencyHz, realOhm, imaginaryOhm };
}

/** The same as files, as a measuring program would have written them: in free air, and with an added mass. */
export function sampleFiles(): { file: File; addedMassKg?: number }[] {
  return [
    { file: asFile(text.common.sampleFiles.freeAir, samplePoints(0, 1)) },
    {
      file: asFile(text.common.sampleFiles.addedMass, samplePoints(SAMPLE_ADDED_MASS_KG, 2)),
      addedMassKg: SAMPLE_ADDED_MASS_KG,
    },
  ];
}

function asFile(name: string, { frequencyHz, realOhm, imaginaryOhm }: ReturnType<typeof samplePoints>): File {
  const rows = Array.from(frequencyHz, (f, i) => {
    const re = realOhm[i] ?? 0;
    const im = imaginaryOhm[i] ?? 0;
    const phaseDeg = (Math.atan2(im, re) * 180) / Math.PI;
    return `${f.toPrecision(8)},${Math.hypot(re, im).toPrecision(7)},${phaseDeg.toPrecision(6)}`;
  });
  return new File([['frequency_hz,magnitude_ohm,phase_deg', ...rows, ''].join('\n')], name, { type: 'text/csv' });
}
