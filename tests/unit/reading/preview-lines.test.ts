import { describe, expect, it } from 'vitest';
import { markLines, previewLines } from '../../../calculators/reading/preview-lines.js';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import { bytesOf, frequencies as f, magnitude as m, phaseDeg, table } from './invented-curve.js';

const text = `# level 0.5 V\nFrequency;Z (Ω);Phase\n\n${table([f, m, phaseDeg], ';')}`.replace(
  '\n1',
  '\nbroken;line\n1',
);
const bytes = bytesOf(text);
const { reading } = readSweep(bytes, { fileName: '' });

describe('previewLines', () => {
  it('shows the first lines as they stand in the file', () => {
    expect(previewLines(bytes, undefined, 5)).toEqual(text.split('\n').slice(0, 5));
  });
  it('shows two-byte text too, and only whole lines of what it looked at', () => {
    const wide = Uint8Array.from(
      `\ufeff${text}`.split('').flatMap((char) => [char.charCodeAt(0) & 255, char.charCodeAt(0) >> 8]),
    );
    expect(previewLines(wide, undefined, 3)).toEqual(text.split('\n').slice(0, 3));
    const long = bytesOf('123456789;123456789\n'.repeat(10_000));
    expect(new Set(previewLines(long, undefined, 5000))).toEqual(new Set(['123456789;123456789']));
  });
  it('shows nothing of what is no text', () => {
    expect(previewLines(Uint8Array.of(0, 1, 2, 3, 0, 0, 0, 7))).toEqual([]);
    expect(previewLines(new Uint8Array())).toEqual([]);
  });
});

describe('markLines', () => {
  const marked = markLines(previewLines(bytes), reading);
  it('tells comments, headings, blank lines, data and lines left out apart', () => {
    expect(marked.slice(0, 6).map(({ kind }) => kind)).toEqual([
      'comment',
      'header',
      'blank',
      'header',
      'data',
      'data',
    ]);
    const skipped = markLines(['10;5;1', 'broken;line', '! note'], { ...reading, headerLines: 0 });
    expect(skipped.map(({ kind }) => kind)).toEqual(['data', 'skipped', 'comment']);
  });
  it('spans each column of the data and of the heading, by characters', () => {
    const heading = marked[1];
    const cells = heading?.spans.map(({ start, end, kind }) => [heading.text.slice(start, end), kind]);
    expect(cells).toEqual([
      ['Frequency', 'frequency'],
      ['Z (Ω)', 'magnitude'],
      ['Phase', 'phase'],
    ]);
    const row = marked[4];
    expect(row?.spans.map(({ start, end }) => row.text.slice(start, end))).toEqual(row?.text.split(';'));
  });
  it('follows a changed reading at once', () => {
    const [line] = markLines(['1,5;2;3'], {
      ...reading,
      headerLines: 0,
      decimalMark: 'comma',
      columns: ['ignore', 'frequency', 'magnitude'],
    });
    expect(line?.spans.map(({ kind }) => kind)).toEqual(['ignore', 'frequency', 'magnitude']);
    expect(line?.kind).toBe('data');
  });
});
