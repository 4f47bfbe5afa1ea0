import { expect, it } from 'vitest';
import { onAllCores } from './on-all-cores.js';
import type { OutOfFamilyAnswer, OutOfFamilyJob } from './out-of-family-worker.js';

/**
 * Real sweeps are never quite of the model family. Twelve drivers that no model describes (coils as ladders of five or
 * six sections, mixed creep, correlated noise, slow drift), 50 seeds each, one with an added mass beside free air.
 */
const DRIVERS = 12;
const SEEDS = Array.from({ length: 50 }, (_, i) => i + 1);
const TEN_MINUTES = 600_000;

it(
  'covers fs, Qts and Vas of drivers outside the model family in 90 % of 600 runs at least, and never misses silently',
  async () => {
    const jobs = Array.from(
      { length: 2 * DRIVERS },
      (_, i): OutOfFamilyJob => ({
        driver: i >> 1,
        seeds: SEEDS.filter((seed) => seed % 2 === i % 2),
      }),
    );
    const answers = await onAllCores<OutOfFamilyJob, OutOfFamilyAnswer>('./out-of-family-worker.ts', jobs);
    const covered = answers.reduce((sum, answer) => sum + answer.covered, 0);
    expect(covered).toBeGreaterThanOrEqual(0.9 * DRIVERS * SEEDS.length);
    expect(answers.reduce((sum, answer) => sum + answer.silentMisses, 0)).toBe(0);
  },
  TEN_MINUTES,
);
