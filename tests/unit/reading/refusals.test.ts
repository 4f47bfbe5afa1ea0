import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import { refuseBySize, SIZE_LIMIT_BYTES, sourceKindOf } from '../../../calculators/reading/size-limits.js';
import { InputError, type InputErrorCode } from '../../../shared/errors.js';
import { bytesOf, frequencies as f, magnitude as m, phaseDeg, table } from './invented-curve.js';

function refusalOf(content: string | Uint8Array, fileName = 'sweep.txt'): InputError {
  try {
    readSweep(typeof content === 'string' ? bytesOf(content) : content, { fileName });
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('it was read');
}
const bytes = (head: string, size = 200) => {
  const content = new Uint8Array(size).fill(120);
  content.set(Uint8Array.from(head, (char) => char.charCodeAt(0)));
  return content;
};
const prose = 'The box has 3 braces, 2 ports and 1 leak.\n'.repeat(20);

describe('a file that is no sweep is refused by its code', () => {
  it.each<[string, InputErrorCode, string | Uint8Array]>([
    ['nothing', 'empty-file', ''],
    ['blanks', 'empty-file', ' \r\n\t\n'],
    ['a byte order mark alone', 'empty-file', '\ufeff'],
    ['a zip archive', 'archive-instead-of-data', bytes('PK\x03\x04')],
    ['a gzip archive', 'archive-instead-of-data', bytes('\x1f\x8b')],
    ['a PDF', 'not-text', bytes('%PDF-1.7')],
    ['a picture', 'not-text', bytes('\x89PNG\r\n')],
    ['zeros', 'not-text', new Uint8Array(500)],
    ['control characters', 'not-text', bytes('\x01\x02\x03\x04\x05')],
    ['a recording', 'wav-unsupported-encoding', bytes('RIFF\x24\x00\x00\x00WAVEfmt ')],
    ['a web page', 'html-instead-of-data', '\n<!DOCTYPE html><html><body>10 20 30</body></html>'],
    ['other markup', 'not-a-curve', '<?xml version="1.0"?><sweep/>'],
    ['structured data', 'not-a-curve', '{"frequency": [10, 20, 30]}'],
    ['prose', 'not-a-curve', prose],
    ['words', 'no-numeric-data', 'name,colour\nhorn,black\n'],
    ['comments only', 'no-numeric-data', '# one\n# two 2\n'],
    ['one column', 'too-few-columns', '1\n2\n3\n4\n5\n6\n7\n8\n9\n'],
    ['a trace against time', 'not-a-curve', `Time (s),Voltage (V)\n${table([f, m], ',')}`],
    ['five rows', 'too-few-points', '10 5\n20 5\n30 5\n40 5\n50 6\n'],
    ['one row', 'too-few-points', '10 5\n'],
    ['seven frequencies over nine rows', 'too-few-points', '10 5\n20 5\n30 5\n40 5\n50 6\n60 6\n70 6\n70 7\n60 7\n'],
    ['one frequency', 'single-frequency', '1000 5\n'.repeat(12)],
    ['a negative frequency', 'negative-frequency', `-5 6\n${table([f, m], ' ')}`],
    ['no impedance', 'zero-impedance', `f Z\n5 0\n${table([f, m], ' ')}`],
    ['an impedance below zero', 'zero-impedance', `f Z\n5 -3\n${table([f, m], ' ')}`],
    ['two ports', 'touchstone-not-one-port', '# Hz S RI R 50\n10 1 2 3 4 5 6 7 8\n20 1 2 3 4 5 6 7 8\n'],
    [
      'two ports of version 2',
      'touchstone-not-one-port',
      '[Version] 2.0\n# Hz S RI\n[Number of Ports] 2\n[Network Data]\n',
    ],
    ['one port', 'touchstone-unsupported', `! sweep\n# kHz Z MA R 50\n${table([f, m, phaseDeg], ' ')}`],
  ])('%s: %s', (_, code, content) => {
    const refusal = refusalOf(content);
    expect(refusal.code).toBe(code);
    expect(refusal.message).toMatch(/^[A-Z].*\.$/s); // whole sentences that say what to do
    expect(refusal.where).toContain('sweep.txt');
  });
  it('names the line of what it refuses', () => {
    expect(refusalOf(`f Z\n\n${table([f, m], ' ')}21000 0\n`).where).toBe('sweep.txt, line 63');
  });
  it('looks at the content, not at the ending of the name', () => {
    expect(refusalOf(bytes('PK\x03\x04'), 'sweep.csv').code).toBe('archive-instead-of-data');
    expect(readSweep(bytesOf(table([f, m])), { fileName: 'sweep.wav' }).reading.rows).toBe(60);
  });
  it('reads a heading behind # that only resembles an option line', () => {
    const { reading } = readSweep(bytesOf(`# Hz Z\n${table([f, m], ' ')}`), { fileName: 'sweep.txt' });
    expect(reading.columnNames).toEqual(['Hz', 'Z']);
  });
});

describe('the size of a file', () => {
  it('is refused before a byte is read, by its kind', () => {
    expect(() => refuseBySize(64 * 1024 * 1024, 'text')).not.toThrow();
    const attempt = () => refuseBySize(200_000_000, 'text', 'huge.csv');
    expect(attempt).toThrow(expect.objectContaining({ code: 'file-too-large', where: 'huge.csv' }));
    expect(attempt).toThrow(/191 MB; text files may have up to 64 MB/);
    expect(() => refuseBySize(200_000_000, 'wav')).not.toThrow();
    expect(() => refuseBySize(SIZE_LIMIT_BYTES.zip + 1, 'zip')).toThrow(InputError);
  });
  it('is judged by the kind that the name tells until the content is known', () => {
    expect(['a.CSV', 'b.wav', 'c.zip', ''].map(sourceKindOf)).toEqual(['text', 'wav', 'zip', 'text']);
  });
});

describe('stopping', () => {
  it('looks for Stop again and again while it reads, and passes on what that throws', () => {
    const text = bytesOf(table([f, m], ' ').repeat(500));
    let looks = 0;
    readSweep(text, {
      fileName: '',
      checkpoint: () => {
        looks += 1;
      },
    });
    expect(looks).toBeGreaterThan(text.length / 1_000_000);
    class Stop extends Error {}
    const stopAt = (at: number) => {
      let seen = 0;
      return readSweep(text, {
        fileName: '',
        checkpoint: () => {
          seen += 1;
          if (seen === at) throw new Stop();
        },
      });
    };
    for (let at = 1; at <= looks; at += 3) expect(() => stopAt(at)).toThrow(Stop);
  });
  it('tells how far it is, ending with the whole', () => {
    const text = bytesOf(table([f, m], ' ').repeat(2000));
    const told: number[] = [];
    readSweep(text, { fileName: '', onProgress: (done, total) => told.push(done / total) });
    expect(told.at(-1)).toBe(1);
    expect(told).toEqual([...told].sort((a, b) => a - b));
    expect(told.length).toBeGreaterThan(3);
  });
});
