import { InputError } from '../../shared/errors.js';
import type { Sweep } from '../kit/sweep.js';
import { resample } from '../reading/resample.js';
import { conditionsOf, loadBytes, loadSweep } from './inputs.js';
import type { Answer, Job } from './job.js';

export const READ_VERSION = 1; // raised on any change of what is read
const FREQUENCIES_MOST = 20_000;

/** Reads one sweep: role `sweep`; settings `reading` (corrections) and `frequencies` (Hz: resample to these). */
export function readJob(job: Job, besides?: string): Answer {
  const { reading, frequencies, ...unknown } = job.settings;
  const [extra] = Object.keys(unknown);
  if (extra !== undefined)
    throw new InputError('bad-setting', `read has no setting named ${extra}; it has reading and frequencies.`, extra);
  const other = job.inputs.find((input) => input.role !== 'sweep');
  if (other) throw new InputError('bad-setting', `read takes no role ${other.role}; it takes sweep.`, other.role);
  const [input, second] = job.inputs;
  if (!input) throw new InputError('missing-input', 'read needs a file with a sweep.', 'sweep');
  if (second) throw new InputError('bad-setting', 'read takes one file at a time.', 'sweep');
  const { file, role, reading: own, ...keys } = input;
  const [key] = Object.keys(keys);
  if (key !== undefined)
    throw new InputError('bad-setting', `The role sweep has no key ${key}. Leave it out.`, `sweep.${key}`);
  const read = loadSweep(loadBytes(file, besides), file, own ?? reading, conditionsOf(role, {}));
  const sweep = frequencies === undefined ? read.sweep : resample(read.sweep, frequencyList(frequencies));
  return { ...curveOf(sweep), reading: read.reading, figures: [], findings: read.findings };
}

function frequencyList(value: unknown): number[] {
  const isList = Array.isArray(value) && value.length > 0 && value.length <= FREQUENCIES_MOST;
  if (isList && value.every((f) => typeof f === 'number' && f > 0 && Number.isFinite(f))) return value as number[];
  const message = `The setting frequencies has to be a list of 1 to ${FREQUENCIES_MOST} frequencies in Hz, each above 0.`;
  throw new InputError('bad-setting', message, 'frequencies');
}

function curveOf({ frequencyHz, realOhm, imaginaryOhm, magnitudeOhm }: Sweep): Answer {
  const frequency = Array.from(frequencyHz);
  if (realOhm && imaginaryOhm) return { frequency, real: Array.from(realOhm), imaginary: Array.from(imaginaryOhm) };
  return { frequency, magnitude: Array.from(magnitudeOhm ?? []) };
}
