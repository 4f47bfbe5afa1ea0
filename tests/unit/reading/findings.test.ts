import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import { FINDING_SEVERITY, type FindingCode } from '../../../shared/findings.js';
import { bytesOf, frequencies as f, magnitude as m, phaseDeg, table } from './invented-curve.js';

const read = (text: string, overrides: ReadingOverrides = {}) =>
  readSweep(bytesOf(text), { fileName: 'sweep.txt', overrides });
const lines = table([f, m, phaseDeg]).trimEnd().split('\n');
const withLine = (at: number, line: string) => [...lines.slice(0, at), line, ...lines.slice(at)].join('\n');

/** The one finding that reading the text gives, with the severity of the list. */
function onlyFinding(text: string, code: FindingCode, overrides: ReadingOverrides = {}) {
  const { findings, ...rest } = read(text, overrides);
  expect(findings.map((finding) => finding.code)).toEqual([code]);
  expect(findings[0]?.severity).toBe(FINDING_SEVERITY[code]);
  return { finding: findings[0], ...rest };
}

describe('findings of a reading', () => {
  it('says that rows were sorted, and sorts them', () => {
    const { sweep, finding } = onlyFinding([...lines].reverse().join('\n'), 'unsorted');
    expect(sweep.frequencyHz[0]).toBeCloseTo(10, 6);
    expect(finding?.message).toContain('fall');
  });
  it('averages a frequency that occurs twice', () => {
    const { sweep } = onlyFinding(withLine(8, lines[7]?.replace(/\t.*/, '\t8.0\t30.0') ?? ''), 'duplicate-frequency');
    expect(sweep.frequencyHz).toHaveLength(60);
    const magnitude = Math.hypot(sweep.realOhm?.[7] ?? 0, sweep.imaginaryOhm?.[7] ?? 0);
    expect(magnitude).toBeCloseTo(((m[7] ?? 0) + 8) / 2, 5);
  });
  it('leaves out a row at 0 Hz', () => {
    const { sweep } = onlyFinding(withLine(0, '0\t5.7\t0'), 'dc-point');
    expect(sweep.frequencyHz).toHaveLength(60);
  });
  it.each([
    ['12\t3', 'Line 21 has 2 columns, the rows around it have 3.'],
    ['10\t20\t30\t40', 'Line 21 has 4 columns, the rows around it have 3.'],
    ['100\tNaN\tNaN', 'Line 21 has no number in column 2.'],
    ['100\t#N/A\t3', 'Line 21 has no number in column 2.'],
    ['100\tbroken\t3', 'Line 21 column 2 reads “broken”, which is no number.'],
    ['100\t1e999\t3', 'Line 21 holds a number too large to use.'],
  ])('leaves out the row “%s” and says why', (row, sentence) => {
    const { reading, finding } = onlyFinding(withLine(20, row), 'rows-skipped');
    expect(finding?.message).toContain(sentence);
    expect(reading.skippedRows).toHaveLength(1);
    expect(reading.skippedRows[0]?.line).toBe(21);
    expect(reading.skippedCount).toBe(1);
  });
  it('takes comments and remarks among the data without a finding, and keeps their words', () => {
    const { findings, reading } = read(
      withLine(20, '! note between').replace(lines[30] as string, `${lines[30]}  # loose clip`),
    );
    expect(findings).toEqual([]);
    expect(reading.rows).toBe(60);
    expect(reading.comments).toEqual(['note between', 'loose clip']);
  });
  it('drops a last row that was cut off between columns', () => {
    const { sweep } = onlyFinding(`${lines.slice(0, 59).join('\n')}\n20000.000000\t9.1`, 'truncated-last-row');
    expect(sweep.frequencyHz).toHaveLength(59);
  });
  it('drops a last row that was cut off within its last number', () => {
    const { sweep } = onlyFinding(lines.join('\n').slice(0, -3), 'truncated-last-row');
    expect(sweep.frequencyHz).toHaveLength(59);
  });
  it('keeps a whole last row that has no line end', () => {
    expect(read(lines.join('\n')).findings).toEqual([]);
  });
  it('reads the first of two tables and says where the second starts', () => {
    const heading = 'Frequency\tImpedance\tPhase';
    const both = [heading, ...lines, '', heading, ...lines.map((line) => line.replace('\t', '\t9'))].join('\n');
    const { finding } = onlyFinding(both, 'rows-skipped');
    expect(finding?.message).toContain('Line 63 starts a second table');
  });
  it('reports a reversed phase sign and leaves it, until it is told to turn it', () => {
    const reversed = table([f, m, phaseDeg.map((value) => -value)]);
    const { sweep, reading } = onlyFinding(reversed, 'phase-sign-flipped');
    expect(sweep.imaginaryOhm?.[59]).toBeLessThan(0);
    expect(reading.guesses.phaseSign?.settled).toBe(false);
    const turned = read(reversed, { phaseSign: 'turned' });
    expect(turned.findings).toEqual([]);
    expect(turned.sweep.imaginaryOhm?.[59]).toBeGreaterThan(0);
  });
  it('does not call the small phase of a resistor reversed', () => {
    const small = f.map((_, i) => (i % 2 === 0 ? -0.02 : 0.015));
    expect(read(table([f, f.map(() => 8.2), small])).findings).toEqual([]);
  });
});

describe('a source of more than 20,000 points', () => {
  const n = 60_000;
  const row = (i: number) => `${(10 + i * 0.5).toFixed(1)}\t${(6 + i * 1e-4).toFixed(6)}\t${(i * 1e-3).toFixed(6)}\n`;
  const { sweep, findings, reading } = read(Array.from({ length: n }, (_, i) => row(i)).join(''));
  it('is thinned with a finding, and its rows are counted whole', () => {
    expect(findings.map((finding) => finding.code)).toEqual(['thinned']);
    expect(sweep.frequencyHz.length).toBeLessThanOrEqual(20_000);
    expect(sweep.frequencyHz.length).toBeGreaterThan(8_000);
    expect(reading.rows).toBe(n);
  });
  it('keeps ascending frequencies and the curve: |Z| follows its line within a millionth', () => {
    sweep.frequencyHz.forEach((frequency, i) => {
      if (i > 0) expect(frequency).toBeGreaterThan(sweep.frequencyHz[i - 1] ?? 0);
      const wanted = 6 + ((frequency - 10) / 0.5) * 1e-4;
      const magnitude = Math.hypot(sweep.realOhm?.[i] ?? 0, sweep.imaginaryOhm?.[i] ?? 0);
      expect(Math.abs(magnitude / wanted - 1)).toBeLessThan(1e-6);
    });
  });
  it('keeps points that stand alone in their bin as they are', () => {
    expect(sweep.frequencyHz[0]).toBe(10);
    expect(sweep.frequencyHz[1]).toBe(10.5);
  });
});
