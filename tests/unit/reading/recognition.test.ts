import { describe, expect, it } from 'vitest';
import { magnitudeOf } from '../../../calculators/kit/sweep.js';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import { ReadingSchema } from '../../../shared/contracts/reading.js';
import {
  bytesOf,
  comma,
  frequencies as f,
  imaginary,
  magnitude as m,
  phaseDeg,
  phaseRad,
  real,
  table,
} from './invented-curve.js';

/** Expected values: the closed form of the invented driver; each file is written from it with six decimals. */
const read = (text: string, overrides: ReadingOverrides = {}) =>
  readSweep(bytesOf(text), { fileName: 'sweep.txt', overrides });
const level = m.map((value) => 20 * Math.log10(value));
const khz = f.map((value) => value / 1000);
const ones = f.map((_, i) => i + 1);

function expectCurve(text: string, columns: string, overrides: ReadingOverrides = {}) {
  const { sweep, reading, findings } = read(text, overrides);
  expect(reading.columns.join(' ')).toBe(columns);
  expect(sweep.frequencyHz).toHaveLength(60);
  for (const [i, value] of f.entries()) expect(sweep.frequencyHz[i]).toBeCloseTo(value, 2);
  real.forEach((value, i) => {
    expect(sweep.realOhm?.[i]).toBeCloseTo(value, 2);
    expect(sweep.imaginaryOhm?.[i]).toBeCloseTo(imaginary[i] ?? 0, 2);
  });
  return { reading, findings };
}

describe('columns without names', () => {
  it('are told by the phase that the magnitude implies: degrees', () => {
    const { reading } = expectCurve(table([f, m, phaseDeg]), 'frequency magnitude phase');
    expect(reading.phaseUnit).toBe('degree');
    expect(reading.guesses.phaseUnit).toMatchObject({ settled: true, toldByPerson: false });
    expect(reading.guesses.magnitudeUnit).toMatchObject({ settled: false });
  });
  it('are told by it: radians', () => {
    const { reading } = expectCurve(table([f, m, phaseRad]), 'frequency magnitude phase');
    expect(reading.phaseUnit).toBe('radian');
  });
  it('are told by it: real and imaginary parts', () => {
    expectCurve(table([f, real, imaginary]), 'frequency real imaginary');
  });
  it('are told by it: a level in dB, left open as a guess', () => {
    const { reading } = expectCurve(table([f, level, phaseDeg]), 'frequency magnitude phase');
    expect(reading.magnitudeUnit).toBe('dB');
    expect(reading.guesses.magnitudeUnit?.settled).toBe(false);
  });
  it('are told by it in another order', () => {
    expectCurve(table([phaseDeg, m, f]), 'phase magnitude frequency');
  });
  it('may start with a count of the rows, which is passed over', () => {
    expectCurve(table([ones, f, m, phaseDeg]), 'ignore frequency magnitude phase');
  });
  it('may be wider than needed', () => {
    expectCurve(table([f, m, phaseDeg, real, imaginary], ','), 'frequency magnitude phase ignore ignore');
  });
  it('are frequency and magnitude when there are two, and that is left open', () => {
    const { sweep, reading } = read(table([f, m]));
    expect(sweep.realOhm).toBeUndefined();
    expect(magnitudeOf(sweep)[30]).toBeCloseTo(m[30] ?? 0, 5);
    expect(reading.guesses.columns?.settled).toBe(false);
  });
  it('in kilohertz are guessed by their range, and that is left open', () => {
    const { reading } = expectCurve(table([khz, m, phaseDeg]), 'frequency magnitude phase');
    expect(reading.frequencyUnit).toBe('kHz');
    expect(reading.guesses.frequencyUnit?.settled).toBe(false);
  });
});

describe('guesses that the data leaves open', () => {
  it('take a magnitude with many values below zero for a level', () => {
    const low = m.map((value) => 20 * Math.log10(value / 10));
    const { sweep, reading } = read(table([f, low]));
    expect(reading.magnitudeUnit).toBe('dB');
    expect(reading.guesses.magnitudeUnit).toMatchObject({ settled: false });
    expect(magnitudeOf(sweep)[30]).toBeCloseTo((m[30] ?? 0) / 10, 5);
  });
  it('are not called named when only one part of a pair is', () => {
    const { reading } = read(`f;Re\n${table([f, real], ';')}`);
    expect(reading.columns).toEqual(['frequency', 'magnitude']);
    expect(reading.guesses.columns?.settled).toBe(false);
  });
  it('read two-byte text without a byte order mark', () => {
    const wide = new Uint8Array(Uint16Array.from(table([f, m, phaseDeg]), (char) => char.charCodeAt(0)).buffer);
    const { reading } = readSweep(wide, { fileName: '' });
    expect(reading).toMatchObject({ encoding: 'utf-16le', rows: 60 });
  });
  it('meet a character beyond plain ones long after the first', () => {
    const rows = table([f, m], ';').repeat(60).trimEnd().split('\n');
    rows[3000] = `${rows[3000]}\u00a0`;
    rows[3001] = `# 20 \u00b0C`;
    const { reading } = read(rows.join('\n'));
    expect(reading.encoding).toBe('utf-8');
    expect(reading.rows).toBe(3599);
    expect(reading.comments).toEqual(['20 \u00b0C']);
  });
});

describe('columns with names', () => {
  it.each([
    [
      'Freq(Hz)\tSPL(dB)\tPhase(deg)\tZ(Ohm)\tZ Phase(deg)',
      [f, ones, ones, m, phaseDeg],
      'frequency ignore ignore magnitude phase',
    ],
    ['f/Hz\t|Z|/Ohm\targ(Z)/rad', [f, m, phaseRad], 'frequency magnitude phase'],
    ["freq/Hz\tZ'/ohm\tZ''/ohm", [f, real, imaginary], 'frequency real imaginary'],
    ['Im(Z)\tRe(Z)\tf', [imaginary, real, f], 'imaginary real frequency'],
    ['Fréquence [Hz]\tModule [Ω]\tPhase [°]', [f, m, phaseDeg], 'frequency magnitude phase'],
    ['Phasenwinkel [Grad]\tBetrag\tFrequenz', [phaseDeg, m, f], 'phase magnitude frequency'],
    [
      'omega (rad/s)\t|Z| (dB re 1 ohm)\tphase (rad)',
      [f.map((v) => 2 * Math.PI * v), level, phaseRad],
      'frequency magnitude phase',
    ],
    [
      'Frequency [kHz]\tImpedance [kΩ]\tPhase [deg]',
      [khz, m.map((v) => v / 1000), phaseDeg],
      'frequency magnitude phase',
    ],
    [
      'Frequency [MHz]\tImpedance [mΩ]\tPhase [deg]',
      [f.map((v) => v / 1e6), m.map((v) => v * 1000), phaseDeg],
      'frequency magnitude phase',
    ],
    ['Frequency\tImpedance\tPhase\nkHz\tOhm\trad', [khz, m, phaseRad], 'frequency magnitude phase'],
  ])('%s are taken by their names', (heading, columns, kinds) => {
    const { reading, findings } = expectCurve(`${heading}\n${table(columns, '\t', (v) => v.toPrecision(12))}`, kinds);
    expect(findings).toEqual([]);
    expect(reading.guesses.columns).toMatchObject({ confidence: 1, settled: true });
  });
  it('may be named in a comment, parted otherwise than the data', () => {
    const { reading } = expectCurve(
      `* Freq (Hz)   Z (Ohm)   Phase (deg)\n${table([f, m, phaseDeg])}`,
      'frequency magnitude phase',
    );
    expect(reading.columnNames).toEqual(['Freq (Hz)', 'Z (Ohm)', 'Phase (deg)']);
    expect(reading.comments).toEqual(['Freq (Hz)   Z (Ohm)   Phase (deg)']);
  });
});

describe('numbers', () => {
  it('with a decimal comma between blanks are not parted at the comma', () => {
    const { reading } = expectCurve(table([f, m, phaseDeg], ' ', comma), 'frequency magnitude phase');
    expect(reading).toMatchObject({ separator: 'space', decimalMark: 'comma' });
    expect(reading.guesses.decimalMark?.settled).toBe(true);
  });
  it('of three decimals behind a comma, all below 1000, could be thousands, and that is said', () => {
    const low = [f, m].map((column) => column.slice(0, 35));
    const { reading, sweep } = read(table(low, '\t', (value) => value.toFixed(3).replace('.', ',')));
    expect(sweep.frequencyHz[0]).toBe(10);
    expect(reading).toMatchObject({ decimalMark: 'comma', thousandsMark: 'none' });
    expect(reading.guesses.decimalMark).toMatchObject({ settled: false });
    expect(reading.guesses.decimalMark?.reason).toMatch(/could also be read/);
  });
  it('of three decimals behind a comma, some above 1000, are settled as decimals', () => {
    const { reading } = read(table([f, m, phaseDeg], '\t', (value) => value.toFixed(3).replace('.', ',')));
    expect(reading.guesses.decimalMark).toMatchObject({ settled: true });
  });
  it('in quotes may hold the comma that parts the columns', () => {
    const { reading } = expectCurve(
      `"Frequency","Z","Phase"\n${table([f, m, phaseDeg], ',', (v) => `"${v.toLocaleString('en-US', { maximumFractionDigits: 6 })}"`)}`,
      'frequency magnitude phase',
    );
    expect(reading).toMatchObject({ separator: 'comma', decimalMark: 'point', thousandsMark: 'comma' });
  });
  it('in quotes may have the decimal comma that parts the columns', () => {
    expectCurve(`"f","Z","phi"\n${table([f, m, phaseDeg], ',', (v) => `"${comma(v)}"`)}`, 'frequency magnitude phase');
  });
  it('may be grouped by no-break blanks and signed by the typographic minus', () => {
    const written = (value: number) =>
      value.toLocaleString('fr-FR', { minimumFractionDigits: 6 }).replace('-', '\u2212');
    const { reading } = expectCurve(table([f, m, phaseDeg], '\t', written), 'frequency magnitude phase');
    expect(reading.thousandsMark).toBe('space');
  });
  it('may carry units that change on the way, and units name the columns', () => {
    const lines = f.map((v, i) => {
      const frequency = v < 1000 ? `${v.toFixed(6)} Hz` : `${(v / 1000).toFixed(9)} kHz`;
      return `${m[i]?.toFixed(6)} Ω; ${frequency}; ${phaseDeg[i]?.toFixed(6)}°`;
    });
    expectCurve(lines.join('\n'), 'magnitude frequency phase');
  });
  it('may be written 1k02 and 4R7', () => {
    const { sweep } = read(
      ['10 4R7', '100 5R1', '1k 6R', '1k02 7', '1.5k 8', '2k2 9R5', '3k3 10', '4k7 1k2', '10k R5'].join('\n'),
    );
    expect([...sweep.frequencyHz]).toEqual([10, 100, 1000, 1020, 1500, 2200, 3300, 4700, 10000]);
    expect([...magnitudeOf(sweep)]).toEqual([4.7, 5.1, 6, 7, 8, 9.5, 10, 1200, 0.5]);
  });
});

describe('every reading', () => {
  it('gives each choice a reason, a confidence and whether the data settles it', () => {
    const { reading } = read(`Frequency,Z,Phase\n${table([f, m, phaseDeg], ',')}`);
    expect(ReadingSchema.safeParse(reading).success).toBe(true);
    for (const guess of Object.values(reading.guesses)) {
      expect(guess?.reason.length).toBeGreaterThan(5);
      expect(guess?.confidence).toBeGreaterThan(0);
    }
    expect(reading.guesses.separator?.reason).toBe('comma, because 60 of 61 lines agree');
  });
  it('is the same for pasted text as for the file', () => {
    const text = table([f, m, phaseDeg]);
    const pasted = readSweep(bytesOf(text), { fileName: '' });
    expect(pasted.reading).toEqual(read(text).reading);
    expect(pasted.sweep.name).toBe('Pasted sweep');
  });
  it('keeps name and conditions as told', () => {
    const { sweep } = readSweep(bytesOf(table([f, m])), {
      fileName: 'C:\\lots\\unit 7.csv',
      conditions: { role: 'added-mass', addedMassKg: 0.01 },
    });
    expect(sweep.name).toBe('unit 7');
    expect(sweep.conditions.addedMassKg).toBe(0.01);
  });
});
