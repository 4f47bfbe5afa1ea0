import { describe, expect, it } from 'vitest';
import { magnitudeOf } from '../../../calculators/kit/sweep.js';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import type { ReadingChoice, ReadingOverrides } from '../../../shared/contracts/reading.js';
import { InputError } from '../../../shared/errors.js';
import {
  bytesOf,
  comma,
  frequencies as f,
  imaginary,
  magnitude as m,
  phaseDeg,
  real,
  table,
} from './invented-curve.js';

const read = (text: string, overrides: ReadingOverrides) =>
  readSweep(bytesOf(text), { fileName: 'sweep.txt', overrides });
const complex = table([f, m, phaseDeg]);
const pair = `f\tre\tim\n${table([f, real, imaginary])}`;

describe('what a person sets', () => {
  it.each([
    ['frequencyUnit', { frequencyUnit: 'kHz' }, 10_000],
    ['frequencyUnit', { frequencyUnit: 'MHz' }, 10_000_000],
    ['frequencyUnit', { frequencyUnit: 'rad/s' }, 10 / (2 * Math.PI)],
    ['headerLines', { headerLines: 1 }, f[1]],
  ] as const)('replaces the guess: %s %o', (choice, overrides, first) => {
    const { sweep, reading } = read(complex, overrides);
    expect(sweep.frequencyHz[0]).toBeCloseTo(first ?? 0, 5);
    expect(reading.guesses[choice]).toMatchObject({ toldByPerson: true, settled: true, confidence: 1 });
    expect(reading).toMatchObject(overrides);
  });
  it.each([
    [{ magnitudeUnit: 'kilohm' }, (m[30] ?? 0) * 1000],
    [{ magnitudeUnit: 'dB' }, 10 ** ((m[30] ?? 0) / 20)],
    [{ columns: ['frequency', 'ignore', 'magnitude'] }, Math.abs(phaseDeg[30] ?? 0)],
  ] as const)('changes the magnitude: %o', (overrides, wanted) => {
    const positive = table([f, m, phaseDeg.map(Math.abs)]);
    const { sweep } = read(positive, overrides as ReadingOverrides);
    expect(magnitudeOf(sweep)[30]).toBeCloseTo(wanted, 3);
  });
  it('takes radians where the heading says degrees', () => {
    const { sweep } = read(`f,Z,phase (deg)\n${table([f, m, phaseDeg.map((value) => value / 100)], ',')}`, {
      phaseUnit: 'radian',
    });
    const angle = Math.atan2(sweep.imaginaryOhm?.[3] ?? 0, sweep.realOhm?.[3] ?? 0);
    expect(angle).toBeCloseTo((phaseDeg[3] ?? 0) / 100, 6);
  });
  it('takes real and imaginary parts instead of magnitude and phase', () => {
    const { sweep } = read(complex, { columns: ['frequency', 'real', 'imaginary'] });
    expect(sweep.realOhm?.[5]).toBeCloseTo(m[5] ?? 0, 5);
    expect(sweep.imaginaryOhm?.[5]).toBeCloseTo(phaseDeg[5] ?? 0, 5);
  });
  it('turns the phase of parts as well', () => {
    const { sweep, reading } = read(pair, { phaseSign: 'turned' });
    expect(sweep.imaginaryOhm?.[5]).toBeCloseTo(-(imaginary[5] ?? 0), 5);
    expect(reading.phaseSign).toBe('turned');
  });
  it('takes the decimal comma for one where the guess was thousands', () => {
    const text = table(
      [f, m].map((column) => column.slice(0, 35)),
      ';',
      (value) => value.toFixed(3).replace('.', ','),
    );
    const { sweep } = read(text, { decimalMark: 'point', thousandsMark: 'comma' });
    expect(sweep.frequencyHz[0]).toBe(10_000);
  });
  it('takes Latin-1 for UTF-8', () => {
    const { reading } = read(`Fréquence;Z\n${table([f, m], ';')}`, { encoding: 'latin1' });
    expect(reading.columnNames[0]).toBe('FrÃ©quence');
    expect(reading.encoding).toBe('latin1');
  });
});

describe('what a person sets and the file cannot bear', () => {
  it.each([
    ['separator', complex, { separator: 'comma' }],
    ['decimalMark', complex, { decimalMark: 'comma' }],
    ['thousandsMark', complex, { decimalMark: 'point', thousandsMark: 'point' }],
    ['thousandsMark', complex, { separator: 'comma', thousandsMark: 'comma' }],
    ['headerLines', complex, { headerLines: 60 }],
    ['columns', table([f, m]), { columns: ['frequency', 'magnitude', 'phase'] }],
    ['columns', complex, { columns: ['magnitude', 'phase'] }],
    ['columns', complex, { columns: ['frequency', 'frequency', 'magnitude'] }],
    ['columns', complex, { columns: ['frequency', 'magnitude', 'imaginary'] }],
    ['columns', complex, { columns: ['frequency', 'real', 'ignore'] }],
    [
      'columns',
      `f;Z;note\n${table([f, m], ';').replaceAll('\n', ';ok\n')}`,
      { columns: ['frequency', 'ignore', 'magnitude'] },
    ],
    ['magnitudeUnit', pair, { magnitudeUnit: 'dB' }],
    ['encoding', `${complex.length % 2 === 0 ? '\n' : ''}${complex}`, { encoding: 'utf-16le' }],
    ['format', complex, { format: 'wav' }],
    ['format', complex, { format: 'touchstone' }],
  ] as const satisfies readonly (readonly [ReadingChoice, string, ReadingOverrides])[] as readonly (readonly [
    ReadingChoice,
    string,
    ReadingOverrides,
  ])[])('is refused by the name of the setting: %s', (choice, text, overrides) => {
    const attempt = () => read(text, overrides);
    expect(attempt).toThrow(InputError);
    expect(attempt).toThrow(expect.objectContaining({ code: 'bad-setting', where: `reading.${choice}` }));
  });
  it('says how the file would read', () => {
    expect(() => read(table([f, m], ';', comma), { separator: 'tab' })).toThrow(
      /reads with semicolon between columns, decimal comma/,
    );
  });
});
