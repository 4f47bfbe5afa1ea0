import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { calculators } from '../../../calculators/index.js';
import { defineCalculator } from '../../../calculators/kit/calculator.js';
import { parsedSettings, runCalculator } from '../../../calculators/kit/run.js';
import type { Sweep } from '../../../calculators/kit/sweep.js';
import { EMPTY_OUTPUT, type Output } from '../../../shared/output.js';

const frequencies = Float64Array.from({ length: 10 }, (_, i) => 10 * 2 ** i);
const sweep: Sweep = {
  name: 'ten points',
  frequencyHz: frequencies,
  magnitudeOhm: frequencies.map((f) => 4 + f / 1000),
  conditions: { role: 'sweep' },
};
const answering = (answer: (magnitudeOhm: Float64Array) => Output) =>
  defineCalculator({
    id: 'sum',
    version: 1,
    title: 'Sum',
    summary: '',
    quick: true,
    roles: {
      sweep: { label: 'Sweep', help: '', least: 1, most: 1, needs: 'sweep', keys: {} },
      weighted: {
        label: 'Weighted',
        help: '',
        least: 0,
        most: 1,
        needs: 'sweep',
        keys: { mass: { label: 'Mass', unit: 'kg', required: true } },
      },
    },
    settings: z.strictObject({ gain: z.number().positive().default(2) }),
    settingsVersion: 2,
    migrate: { 1: ({ factor, ...rest }) => ({ ...rest, gain: factor }) },
    figures: [{ id: 'total', symbol: 'S', name: 'Total', unit: 'Ω', definition: '', source: '' }],
    run: (inputs) => answer(inputs.sweep?.[0]?.sweep?.magnitudeOhm ?? new Float64Array()),
  });
const sum = answering((z) => ({
  ...EMPTY_OUTPUT,
  figures: [{ id: 'total', unit: 'Ω', value: z.reduce((a, b) => a + b, 0) }],
}));
const inputs = { sweep: [{ sweep, keys: {} }] };

describe('what goes in', () => {
  it('fills in defaults and brings old settings up to date', () => {
    expect(parsedSettings(sum, {})).toEqual({ gain: 2 });
    expect(parsedSettings(sum, { factor: 5 }, 1)).toEqual({ gain: 5 });
  });

  it.each([
    ['a value out of range', { gain: -1 }, 2, 'gain'],
    ['an unknown setting', { loudness: 1 }, 2, 'loudness'],
    ['settings of a version to come', {}, 3, 'settingsVersion'],
  ])('refuses %s as bad-setting and names it', (_, settings, version, where) => {
    expect(() => runCalculator(sum, inputs, settings, undefined, version)).toThrow(
      expect.objectContaining({ name: 'InputError', code: 'bad-setting', where }),
    );
  });

  it.each([
    ['no sweep', {}, 'missing-input', 'sweep'],
    ['an input that holds no sweep', { sweep: [{ keys: {} }] }, 'missing-input', 'sweep'],
    ['one sweep too many', { sweep: [...inputs.sweep, ...inputs.sweep] }, 'bad-setting', 'sweep'],
    ['an unknown role', { ...inputs, ghost: [] }, 'bad-setting', 'ghost'],
    ['a missing mass', { ...inputs, weighted: inputs.sweep }, 'missing-input', 'weighted.mass'],
    ['a mass of 0', { ...inputs, weighted: [{ sweep, keys: { mass: 0 } }] }, 'bad-setting', 'weighted.mass'],
    ['a mass in words', { ...inputs, weighted: [{ sweep, keys: { mass: 'ten' } }] }, 'bad-setting', 'weighted.mass'],
    ['an unknown key', { sweep: [{ sweep, keys: { colour: 3 } }] }, 'bad-setting', 'sweep.colour'],
  ])('refuses %s with a typed error that names the place', (_, given, code, where) => {
    expect(() => runCalculator(sum, given, {})).toThrow(expect.objectContaining({ name: 'InputError', code, where }));
  });

  it.each([
    [
      'too few points',
      { frequencyHz: frequencies.slice(0, 4), magnitudeOhm: frequencies.slice(0, 4) },
      'too-few-points',
    ],
    ['one point', { frequencyHz: frequencies.slice(0, 1), magnitudeOhm: frequencies.slice(0, 1) }, 'single-frequency'],
    ['a frequency of 0', { frequencyHz: frequencies.map((f, i) => (i ? f : 0)) }, 'negative-frequency'],
    ['an impedance of 0', { magnitudeOhm: frequencies.map((f, i) => (i === 3 ? 0 : f)) }, 'zero-impedance'],
    ['a gap', { magnitudeOhm: frequencies.map((f, i) => (i === 3 ? Number.NaN : f)) }, 'not-a-curve'],
    ['curves of unequal length', { magnitudeOhm: frequencies.slice(1) }, 'not-a-curve'],
  ])('refuses a sweep with %s', (_, change, code) => {
    const bad = { sweep: [{ sweep: { ...sweep, ...change }, keys: {} }] };
    expect(() => runCalculator(sum, bad, {})).toThrow(expect.objectContaining({ name: 'InputError', code }));
  });

  it('puts rows in order and averages rows of one frequency before the calculator sees them', () => {
    const seen: number[][] = [];
    const watching = answering((z) => {
      seen.push([...z]);
      return EMPTY_OUTPUT;
    });
    const shuffled = {
      ...sweep,
      frequencyHz: Float64Array.from([80, 10, 20, 30, 40, 50, 60, 70, 10]),
      magnitudeOhm: Float64Array.from([8, 1, 2, 3, 4, 5, 6, 7, 3]),
    };
    runCalculator(watching, { sweep: [{ sweep: shuffled, keys: {} }] }, {});
    expect(seen).toEqual([[2, 2, 3, 4, 5, 6, 7, 8]]);
    expect(shuffled.frequencyHz[0]).toBe(80);
  });
});

describe('what comes out', () => {
  it('hands on a sound answer unchanged', () => {
    expect(runCalculator(sum, inputs, {}).figures[0]?.value).toBeCloseTo(40 + 10.23, 10);
  });

  it.each([
    ['a figure that is not a number', { figures: [{ id: 'total', unit: 'Ω', value: Number.NaN }] }],
    ['a figure that was not declared', { figures: [{ id: 'extra', unit: 'Ω', value: 1 }] }],
    [
      'a curve with a gap',
      {
        traces: [
          {
            id: 't',
            label: '',
            x: [1, 2],
            y: [1, Number.POSITIVE_INFINITY],
            xUnit: 'Hz',
            yUnit: 'Ω',
            axis: 'other' as const,
          },
        ],
      },
    ],
    [
      'a curve shorter than its frequencies',
      { traces: [{ id: 't', label: '', x: [1, 2], y: [1], xUnit: 'Hz', yUnit: 'Ω', axis: 'other' as const }] },
    ],
  ])('never lets %s out', (_, part) => {
    expect(() =>
      runCalculator(
        answering(() => ({ ...EMPTY_OUTPUT, ...part })),
        inputs,
        {},
      ),
    ).toThrow(/^sum: /);
  });
});

it('holds every calculator of the registry to unique ids and declared figures', () => {
  const ids = calculators.map(({ id }) => id);
  expect(new Set(ids).size).toBe(ids.length);
  for (const { figures } of calculators) expect(new Set(figures.map(({ id }) => id)).size).toBe(figures.length);
});
