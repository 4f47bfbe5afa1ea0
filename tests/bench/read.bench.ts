import { closeSync, mkdtempSync, openSync, readFileSync, readSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { quantile } from '../../calculators/numerics/statistics.js';
import { readSweep } from '../../calculators/reading/read-sweep.js';
import { readCharacters } from '../../calculators/reading/text/encoding.js';
import { scanRows } from '../../calculators/reading/text/rows/scan-rows.js';
import type { Bench, Measured } from './bench.js';
import { ScipyProcess } from './scipy-process.js';

const ROWS = 1_000_000;
const ROUNDS = 15; // ours and theirs in turn, so that both meet the same machine
const BAR = 1.1; // times faster than numpy.loadtxt

interface Source {
  readonly name: string;
  readonly path: string;
  readonly delimiter: string;
  readonly format: string; // of each number, as C writes it
  readonly isBar: boolean;
}
interface Answer {
  readonly ms: number;
  readonly rows: number;
}

/** How many of the numbers of the file differ from Number() of their text in any bit. */
function differing(path: string, delimiter: string): number {
  const bytes = readFileSync(path);
  const text = readCharacters(bytes, undefined, () => {});
  const table = scanRows(
    text,
    {
      dialect: { separator: delimiter === '\t' ? 'tab' : 'comma', decimalMark: 'point', thousandsMark: 'none' },
      shape: { fields: 3, isNumber: [true, true, true] },
      take: [0, 1, 2].map((column) => ({ column, exponent: 0, unitExponent: 0 })),
      dataStart: bytes.indexOf(10) + 1,
      fixedDecimals: 0,
      firstLine: 2,
      rowsExpected: ROWS,
    },
    { progress: () => {}, checkpoint: () => {} },
  );
  let count = Math.abs(table.rows - ROWS);
  let row = 0;
  for (const line of bytes.toString('latin1').trimEnd().split('\n').slice(1)) {
    const cells = line.split(delimiter);
    for (let column = 0; column < 3; column += 1) {
      if (!Object.is(table.values[column]?.[row], Number(cells[column]))) count += 1;
    }
    row += 1;
  }
  return count;
}

/** Holds the file: memory that is already there, as the allocator of the other side keeps its own. */
const memory = Buffer.alloc(80_000_000, 1);

/** Milliseconds to read the file whole, from opening it to the thinned sweep; and the longest time without a look for Stop. */
function readOnce(path: string): { readonly ms: number; readonly gapMs: number } {
  const start = performance.now();
  let last = start;
  let gapMs = 0;
  const checkpoint = () => {
    const now = performance.now();
    gapMs = Math.max(gapMs, now - last);
    last = now;
  };
  const file = openSync(path, 'r');
  const size = readSync(file, memory);
  closeSync(file);
  const { reading } = readSweep(memory.subarray(0, size), { fileName: path, checkpoint });
  checkpoint();
  if (reading.rows !== ROWS) throw new Error(`${reading.rows} of ${ROWS} rows were read`);
  return { ms: performance.now() - start, gapMs };
}

async function compare(source: Source, numpy: ScipyProcess): Promise<Measured[]> {
  const ours: number[] = [];
  const theirs: number[] = [];
  const gaps: number[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    const { ms, gapMs } = readOnce(source.path);
    ours.push(ms);
    gaps.push(gapMs);
    const answer = await numpy.ask<Answer>({ path: source.path, delimiter: source.delimiter });
    if (answer.rows !== ROWS) throw new Error(`numpy.loadtxt read ${answer.rows} of ${ROWS} rows`);
    theirs.push(answer.ms);
  }
  const [our, their] = [quantile(ours, 0.5), quantile(theirs, 0.5)];
  const note = `${our.toFixed(0)} ms (first ${ours[0]?.toFixed(0)}), numpy.loadtxt ${their.toFixed(0)} ms, medians of ${ROUNDS}`;
  return [
    {
      name: `${source.name}: times faster`,
      value: their / our,
      unit: '×',
      note,
      ...(source.isBar && { atLeast: BAR }),
    },
    {
      name: `${source.name}: numbers unlike Number()`,
      value: differing(source.path, source.delimiter),
      unit: '',
      atMost: 0,
    },
    { name: `${source.name}: longest time without a look`, value: quantile(gaps, 0.5), unit: 'ms' },
  ];
}

export const bench: Bench = {
  title: `Reading a text of ${ROWS} rows, recognition, sorting and thinning included, beside numpy.loadtxt told the delimiter`,
  async run() {
    const folder = mkdtempSync(join(tmpdir(), 'hummock-read-'));
    const numpy = new ScipyProcess('./read_numpy.py');
    try {
      await numpy.next();
      const sources: Source[] = [
        { name: 'six decimals, tabs', path: join(folder, 'tabs.txt'), delimiter: '\t', format: '%.6f', isBar: true },
        { name: '17 digits, commas', path: join(folder, 'commas.csv'), delimiter: ',', format: '%.17g', isBar: false },
      ];
      const measured: Measured[] = [];
      for (const source of sources) {
        const { path, delimiter, format } = source;
        await numpy.ask({ path, delimiter, format, rows: ROWS }); // written over there, so that no heap here is full of it
        measured.push(...(await compare(source, numpy)));
      }
      return measured;
    } finally {
      numpy.close();
      rmSync(folder, { recursive: true });
    }
  },
};
