import type { Reading, ReadingOverrides } from '../../shared/contracts/reading.js';
import type { SweepConditions } from '../../shared/contracts/sweep.js';
import { InputError } from '../../shared/errors.js';
import type { Finding } from '../../shared/output.js';
import type { Sweep } from '../kit/sweep.js';
import { refuseBySize } from './size-limits.js';
import { refuseOtherThanText } from './sniff.js';
import { readText, type TextReading } from './text/read-text.js';
import { refuseTouchstone } from './touchstone-sniff.js';

export interface ReadOptions {
  readonly fileName: string; // '' for pasted text
  readonly name?: string | undefined; // of the sweep; the file's without its ending otherwise
  readonly conditions?: SweepConditions | undefined;
  readonly overrides?: ReadingOverrides | undefined;
  /** Characters read of all; called at least every 50 ms or so of work. */
  readonly onProgress?: ((done: number, total: number) => void) | undefined;
  /** Called as often; throws to stop the reading. */
  readonly checkpoint?: (() => void) | undefined;
}
export interface SweepReading {
  readonly sweep: Sweep;
  readonly reading: Reading;
  readonly findings: Finding[];
}

/**
 * Reads one sweep from the bytes of a file, recognised by its content: a table of frequency and impedance in any customary dialect.
 * Frequencies in Hz, ascending, each once; impedance in ohm; at most 20,000 points. The reading says how each part was
 * understood and why; `overrides` replaces any part of it. Errors: InputError, with `where` naming file and line, or the setting.
 */
export function readSweep(bytes: Uint8Array, options: ReadOptions): SweepReading {
  const { fileName, overrides = {} } = options;
  refuseBySize(bytes.length, 'text', fileName);
  refuseFormat(overrides);
  refuseOtherThanText(bytes, fileName);
  refuseTouchstone(bytes, fileName);
  const watch = {
    checkpoint: options.checkpoint ?? (() => {}),
    progress: options.onProgress ?? (() => {}),
  };
  const { points, isPair, reading, findings } = readText(bytes, fileName, overrides, watch);
  const name = options.name ?? (fileName.replace(/^.*[\\/]/, '').replace(/\.[^.]*$/, '') || 'Pasted sweep');
  const conditions = options.conditions ?? { role: 'sweep' };
  return { sweep: { name, conditions, ...curveOf(points, isPair) }, reading, findings };
}

function refuseFormat(overrides: ReadingOverrides): void {
  if (overrides.format === undefined || overrides.format === 'text') return;
  throw new InputError(
    'bad-setting',
    `Only text tables can be read; the format is set to ${overrides.format}.`,
    'reading.format',
  );
}

function curveOf(points: TextReading['points'], isPair: boolean): Omit<Sweep, 'name' | 'conditions'> {
  const { frequency: frequencyHz, first, second } = points;
  if (!second) return { frequencyHz, magnitudeOhm: first };
  if (isPair) return { frequencyHz, realOhm: first, imaginaryOhm: second };
  const realOhm = first.map((size, i) => size * Math.cos(second[i]!));
  const imaginaryOhm = first.map((size, i) => size * Math.sin(second[i]!));
  return { frequencyHz, realOhm, imaginaryOhm };
}
