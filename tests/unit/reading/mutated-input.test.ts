import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { markLines, previewLines } from '../../../calculators/reading/preview-lines.js';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import { InputError } from '../../../shared/errors.js';

/** Seeded numbers in [0, 1): xorshift32 (G. Marsaglia, "Xorshift RNGs", 2003, from memory). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
}

const folder = 'tests/fixtures/text-dialects';
const files = [folder, `${folder}/bad`].flatMap((from) =>
  readdirSync(from)
    .filter((name) => /\.(txt|csv|html|s2p)$/.test(name))
    .map((name) => new Uint8Array(readFileSync(`${from}/${name}`))),
);
const SCRAPS = [
  '\n',
  '\r',
  '\t',
  ',',
  ';',
  '"',
  ' ',
  '0',
  '-',
  'e',
  '1e400',
  'NaN',
  '#',
  '\u00b0',
  '\0',
  '1,000.5',
  '\ufeff',
  '\u2212',
  '[',
];

/** One to eight random injuries: bytes changed, cut out, doubled, scraps put in, the end cut off. */
function injured(original: Uint8Array, random: () => number): Uint8Array {
  let bytes = original;
  const below = (n: number) => Math.floor(random() * n);
  for (let left = 1 + below(8); left > 0; left -= 1) {
    const at = below(bytes.length + 1);
    const to = Math.min(bytes.length, at + below(40));
    const [head, tail] = [bytes.subarray(0, at), bytes.subarray(at)];
    const scrap = new TextEncoder().encode(SCRAPS[below(SCRAPS.length)]);
    const kinds = [
      () => bytes.map((byte, i) => (i === at ? below(256) : byte)),
      () => joined(head, bytes.subarray(to)),
      () => joined(head, bytes.subarray(at, to), tail),
      () => joined(head, scrap, tail),
      () => joined(head, scrap, scrap, scrap, tail),
      () => head,
    ];
    bytes = (kinds[below(kinds.length)] as () => Uint8Array)();
  }
  return bytes;
}

function joined(...parts: readonly Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

/** Reads, and checks what any sweep must be: ascending, above zero, finite, eight points or more. */
function expectSoundOrRefused(bytes: Uint8Array): 'read' | 'refused' {
  const lines = previewLines(bytes);
  try {
    const { sweep, reading } = readSweep(bytes, { fileName: 'mutated.txt' });
    const { frequencyHz, realOhm, imaginaryOhm, magnitudeOhm } = sweep;
    expect(frequencyHz.length).toBeGreaterThanOrEqual(8);
    expect(frequencyHz.every((f, i) => f > (i === 0 ? 0 : (frequencyHz[i - 1] ?? 0)) && Number.isFinite(f))).toBe(true);
    for (const curve of [realOhm, imaginaryOhm, magnitudeOhm]) expect(curve?.every(Number.isFinite) ?? true).toBe(true);
    for (const { text, spans } of markLines(lines, reading)) {
      for (const span of spans) expect(span.end).toBeLessThanOrEqual(text.length);
    }
    return 'read';
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    expect(error.message.length).toBeGreaterThan(10);
    return 'refused';
  }
}

describe('injured files', () => {
  it('are read soundly or refused by a typed error, each within two seconds', () => {
    const random = seeded(20310214);
    const count = { read: 0, refused: 0 };
    let slowest = 0;
    for (let round = 0; round < 3000; round += 1) {
      const bytes = injured(files[round % files.length] as Uint8Array, random);
      const start = performance.now();
      count[expectSoundOrRefused(bytes)] += 1;
      slowest = Math.max(slowest, performance.now() - start);
    }
    expect(slowest).toBeLessThan(2000);
    expect(count.read).toBeGreaterThan(1000);
    expect(count.refused).toBeGreaterThan(500);
  }, 120_000);

  it.each([
    ['one line of a million digits', '1'.repeat(1_000_000)],
    ['one line of half a million columns', '1 '.repeat(500_000)],
    ['a quote that never closes', `"${'x\n'.repeat(300_000)}`],
    ['quotes without end', '"'.repeat(500_000)],
    ['line ends only', '\n'.repeat(1_000_000)],
    ['comments only', '# 10 20\n'.repeat(200_000)],
    ['a heading on every second line', 'f Z\n10 5\n'.repeat(100_000)],
    ['brackets without end', `${'('.repeat(200_000)}\n`],
    ['a table with many comments behind it', `${'10 5\n11 6\n'.repeat(400)}${'# x\n'.repeat(300_000)}`],
    ['a table with millions of blank lines behind it', `${'10 5\n11 6\n'.repeat(400)}${'\n'.repeat(2_000_000)}`],
    ['numbers too large on every second line', '10 5e999\n\n'.repeat(200_000)],
    ['rows that never look alike', Array.from({ length: 30_000 }, (_, i) => '7 '.repeat(i % 50)).join('\n')],
    ['separators only', ';;;;\n'.repeat(200_000)],
    ['numbers parted by every separator in turn', '1,2;3\t4 5\n'.repeat(100_000)],
  ])('do not hold up the reader: %s', (_, text) => {
    const start = performance.now();
    expectSoundOrRefused(new TextEncoder().encode(text));
    expect(performance.now() - start).toBeLessThan(2000);
  });
});
