import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import { anyDialect, writeFile } from './random-dialect.js';

/** Rising frequencies at least 0.5 Hz apart, so that no places of the file make two of them one; any phase, any part above zero. */
const thousandths = (min: number, max: number) => fc.integer({ min: min * 1000, max: max * 1000 }).map((n) => n / 1000);
const anyRows = fc
  .tuple(
    thousandths(2, 50),
    fc.array(fc.tuple(thousandths(1.02, 1.3), thousandths(2, 900), thousandths(-89, 89)), {
      minLength: 12,
      maxLength: 60,
    }),
  )
  .map(([start, steps]) => {
    let f = start;
    return steps.map(([ratio, a, b]) => {
      f = f * ratio + 0.5;
      return [f, a, b] as const;
    });
  });

describe('a curve written in any dialect', () => {
  it('is read back exactly as written', () => {
    const exact = fc.property(anyRows, anyDialect, (rows, dialect) => {
      const file = writeFile(rows, dialect);
      const { sweep, reading, findings } = readSweep(file.bytes, { fileName: 'random.txt' });
      const hz = dialect.frequencyUnit === 'kHz' ? 'e3' : 'e0';
      const ohm = dialect.sizeUnit === 'kOhm' ? 'e3' : 'e0';
      const value = (text: string, power: string) => {
        const [digits = '', own = '0'] = text.split('e');
        return Number(`${digits}e${Number(own) + Number(power.slice(1))}`);
      };
      expect([...sweep.frequencyHz]).toEqual(file.frequency.map((text) => value(text, hz)));
      expect(reading.columns.filter((kind) => kind !== 'ignore')).toHaveLength(3);
      expect(findings.filter((finding) => finding.code !== 'phase-sign-flipped')).toEqual([]);
      const [re, im] = [sweep.realOhm ?? [], sweep.imaginaryOhm ?? []];
      if (dialect.isPair) {
        expect([...re]).toEqual(file.first.map((text) => value(text, ohm)));
        expect([...im]).toEqual(file.second.map((text) => value(text, ohm)));
        return;
      }
      file.first.forEach((text, i) => {
        const size = dialect.sizeUnit === 'dB' ? 10 ** (Number(text) / 20) : value(text, ohm);
        const phase = Number(file.second[i]) * (dialect.phaseUnit === 'rad' ? 1 : Math.PI / 180);
        const away = Math.hypot((re[i] ?? 0) - size * Math.cos(phase), (im[i] ?? 0) - size * Math.sin(phase));
        expect(away / size).toBeLessThan(1e-14);
      });
    });
    fc.assert(exact, { numRuns: 400, seed: 1, endOnFailure: true });
  }, 60_000);
});
