import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { magnitudeOf } from '../../calculators/kit/sweep.js';
import { readSweep } from '../../calculators/reading/read-sweep.js';
import { InputError } from '../../shared/errors.js';
import { FINDING_SEVERITY } from '../../shared/findings.js';

/**
 * One simulated curve in 24 dialects and 14 files that must be refused or repaired, with the values exactly as written
 * (tests/fixtures/text-dialects/truth.json, simulated with ngspice-39 and checked against a closed formula).
 */
interface Case {
  readonly file: string | null;
  readonly description?: string;
  readonly expect: 'curve' | 'error' | 'either';
  readonly warnings?: readonly string[];
  readonly error_kinds?: readonly string[];
  readonly relative_tolerance?: number;
  readonly f: readonly number[];
  readonly re?: readonly number[];
  readonly im?: readonly number[];
  readonly magnitude?: readonly number[];
  readonly magnitude_min?: readonly number[];
  readonly magnitude_max?: readonly number[];
}
const folder = 'tests/fixtures/text-dialects';
const truth: { readonly files: readonly Case[]; readonly bad: readonly Case[] } = JSON.parse(
  readFileSync(`${folder}/truth.json`, 'utf8'),
);
const read = (file: string) => readSweep(readFileSync(`${folder}/${file}`), { fileName: file });
const refusalOf = (file: string): InputError => {
  try {
    read(file);
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error(`${file} was read`);
};

function expectCurve(entry: Case): void {
  const { sweep, findings } = read(entry.file as string);
  expect([...sweep.frequencyHz]).toEqual(entry.f);
  expect(findings.map((finding) => finding.code).sort()).toEqual([...(entry.warnings ?? [])].sort());
  for (const { code, severity } of findings) expect(severity).toBe(Object(FINDING_SEVERITY)[code]);
  const tolerance = entry.relative_tolerance ?? 1e-6;
  const magnitude = magnitudeOf(sweep);
  if (entry.magnitude) expect([...magnitude]).toEqual(entry.magnitude);
  entry.re?.forEach((re, i) => {
    const im = entry.im?.[i] ?? Number.NaN;
    const away = Math.hypot((sweep.realOhm?.[i] ?? Number.NaN) - re, (sweep.imaginaryOhm?.[i] ?? Number.NaN) - im);
    if (!entry.magnitude_min) expect(away / Math.hypot(re, im)).toBeLessThan(tolerance);
  });
  entry.magnitude_min?.forEach((least, i) => {
    expect(magnitude[i]).toBeGreaterThanOrEqual(least * (1 - 1e-12));
    expect(magnitude[i]).toBeLessThanOrEqual((entry.magnitude_max?.[i] ?? 0) * (1 + 1e-12));
  });
}

describe('text dialects', () => {
  it.each(truth.files.map((entry) => [entry.file, entry.description, entry] as const))(
    'reads %s: %s',
    (_f, _d, entry) => expectCurve(entry),
  );
  it('covers all 24 dialects', () => expect(truth.files).toHaveLength(24));
});

describe('bad files', () => {
  const text = truth.bad.filter(({ file }) => file && !file.endsWith('.wav'));
  it.each(text.filter((entry) => entry.expect === 'error').map((entry) => [entry.file as string, entry] as const))(
    'refuses %s by its code, in words',
    (file, entry) => {
      const refusal = refusalOf(file);
      expect(entry.error_kinds).toContain(refusal.code);
      expect(refusal.message).toMatch(/^[A-Z].*\.$/s);
      expect(refusal.where).toContain(file);
    },
  );
  it.each(text.filter((entry) => entry.expect === 'curve').map((entry) => [entry.file as string, entry] as const))(
    'repairs %s and says so',
    (_file, entry) => expectCurve(entry),
  );
  it.each(truth.bad.filter(({ file }) => file?.endsWith('.wav')).map(({ file }) => file as string))(
    'refuses %s in words, as a recording is no text',
    (file) => expect(refusalOf(file).code).toBe('wav-unsupported-encoding'),
  );
  it('names the line of the first negative frequency', () => {
    expect(refusalOf('bad/negative-frequencies.txt').where).toBe('bad/negative-frequencies.txt, line 1');
  });
});
