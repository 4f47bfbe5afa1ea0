import { readFileSync, statSync } from 'node:fs';
import { basename } from 'node:path';
import { type ReadingOverrides, ReadingOverridesSchema } from '../../shared/contracts/reading.js';
import { SWEEP_ROLES, type SweepConditions } from '../../shared/contracts/sweep.js';
import { InputError } from '../../shared/errors.js';
import { type Output, OutputSchema } from '../../shared/output.js';
import type { RoleInput } from '../kit/calculator.js';
import { issueWords } from '../kit/issue-words.js';
import type { Sweep } from '../kit/sweep.js';
import { readSweep, type SweepReading } from '../reading/read-sweep.js';
import { refuseBySize, sourceKindOf } from '../reading/size-limits.js';
import { jsonOrText, splitOnce } from './arguments.js';
import { locate } from './paths.js';

export interface InputFile {
  readonly role: string;
  readonly file: string;
  readonly keys: Readonly<Record<string, unknown>>;
  readonly besides?: string | undefined; // a further folder to look in
}

/** The part of `--in ROLE=FILE?key=value&…` behind the role. A file may have a question mark in its name. */
export function splitKeys(text: string): { readonly file: string; readonly keys: Record<string, unknown> } {
  const at = text.lastIndexOf('?');
  const tail = at < 0 ? '' : text.slice(at + 1);
  if (at < 0 || !/^[^=&]+=[^&]*(&[^=&]+=[^&]*)*$/.test(tail)) return { file: text, keys: {} };
  const keys = Object.fromEntries(tail.split('&').map((pair) => keyOf(...splitOnce(pair, '='))));
  return { file: text.slice(0, at), keys };
}

function keyOf(name: string, value = ''): [string, unknown] {
  return [
    name,
    value.trim() !== '' && Number.isFinite(Number(value))
      ? Number(value)
      : name === 'reading'
        ? jsonOrText(value)
        : value,
  ];
}

/** Bytes of a file, refused by its size before it is opened. Errors: `missing-input`, `file-too-large`. */
export function loadBytes(name: string, besides?: string): Uint8Array {
  const path = locate(name, besides);
  try {
    const stat = statSync(path);
    if (!stat.isFile()) throw new InputError('missing-input', 'This is no file. Name a file with a sweep in it.', name);
    refuseBySize(stat.size, sourceKindOf(name), name);
    return readFileSync(path);
  } catch (error) {
    if (error instanceof InputError) throw error;
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    const what = code === 'ENOENT' ? 'There is no such file' : 'The file cannot be opened';
    throw new InputError('missing-input', `${what}. Check its name and folder.`, name);
  }
}

/** A file with the keys of its role: a sweep, or an earlier result where the file holds one. */
export function loadInput({ role, file, keys, besides }: InputFile): RoleInput {
  const bytes = loadBytes(file, besides);
  const { reading, ...plain } = keys;
  const given = keysOf(plain, role);
  const json = jsonOf(bytes);
  if (json) {
    const sweep = sweepIn(json, file, conditionsOf(role, given));
    return sweep ? { sweep, keys: given } : { result: resultIn(json, file), keys: given };
  }
  return { sweep: loadSweep(bytes, file, reading, conditionsOf(role, given)).sweep, keys: given };
}

export function loadSweep(
  bytes: Uint8Array,
  file: string,
  reading: unknown,
  conditions: SweepConditions,
): SweepReading {
  return readSweep(bytes, { fileName: basename(file), conditions, overrides: overridesOf(reading) });
}

/** The corrections of a reading. Error: `bad-setting` naming the part. */
export function overridesOf(reading: unknown): ReadingOverrides {
  const parsed = ReadingOverridesSchema.safeParse(reading ?? {});
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  const part = issue?.code === 'unrecognized_keys' ? issue.keys.join(', ') : (issue?.path.map(String).join('.') ?? '');
  const where = part ? `reading.${part}` : 'reading';
  throw new InputError('bad-setting', `The setting ${where} cannot be used: ${issueWords(issue)}.`, where);
}

function keysOf(keys: Readonly<Record<string, unknown>>, role: string): RoleInput['keys'] {
  const given: Record<string, number | string> = {};
  for (const [name, value] of Object.entries(keys)) {
    if (typeof value !== 'number' && typeof value !== 'string') {
      throw new InputError('bad-setting', `The key ${name} has to be a number or a text.`, `${role}.${name}`);
    }
    given[name] = value;
  }
  return given;
}

/** What the keys tell of the conditions; a key out of range is left to the calculator to refuse. */
export function conditionsOf(role: string, keys: RoleInput['keys']): SweepConditions {
  const known = SWEEP_ROLES.find((name) => name === role) ?? (role === 'driver' ? 'free-air' : 'sweep');
  const positive = (value: unknown, most: number) =>
    typeof value === 'number' && value > 0 && value <= most ? value : undefined;
  const addedMassKg = positive(keys.mass, 10);
  const testVolumeM3 = positive(keys.volume, 100);
  const radiatorMassKg = keys.radiatorMass === 0 ? 0 : positive(keys.radiatorMass, 10);
  return {
    role: known,
    ...(addedMassKg !== undefined && { addedMassKg }),
    ...(testVolumeM3 !== undefined && { testVolumeM3 }),
    ...(radiatorMassKg !== undefined && { radiatorMassKg }),
  };
}

type Json = Readonly<Record<string, unknown>>;

function jsonOf(bytes: Uint8Array): Json | undefined {
  let first = 0;
  while (first < bytes.length && (bytes[first] ?? 0) <= 32) first += 1;
  if (bytes[first] !== 123) return undefined; // {
  const json = jsonOrText(new TextDecoder().decode(bytes));
  return typeof json === 'object' && json !== null ? (json as Json) : undefined;
}

/** The answer of `read`, given back as an input. */
function sweepIn(json: Json, file: string, conditions: SweepConditions): Sweep | undefined {
  if (!Array.isArray(json.frequency)) return undefined;
  const list = (name: string) => {
    const values = json[name];
    if (values === undefined) return undefined;
    const isList = Array.isArray(values) && values.length === (json.frequency as unknown[]).length;
    if (isList && values.every((value) => typeof value === 'number')) return Float64Array.from(values as number[]);
    throw new InputError('no-numeric-data', `The list ${name} has to hold one number for each frequency.`, file);
  };
  const [frequencyHz, realOhm, imaginaryOhm, magnitudeOhm] = ['frequency', 'real', 'imaginary', 'magnitude'].map(list);
  const plain = { name: basename(file), conditions, frequencyHz: frequencyHz as Float64Array };
  if (realOhm && imaginaryOhm) return { ...plain, realOhm, imaginaryOhm };
  if (magnitudeOhm) return { ...plain, magnitudeOhm };
  throw new InputError('no-numeric-data', 'This sweep has neither real and imaginary parts nor a magnitude.', file);
}

function resultIn(json: Json, file: string): Output {
  const { summary, fit, figures, traces = [], markers = [], findings = [], tables = [] } = json;
  const parsed = OutputSchema.safeParse({
    ...(summary !== undefined && { summary }),
    ...(fit !== undefined && { fit }),
    figures,
    traces,
    markers,
    findings,
    tables,
  });
  if (parsed.success) return parsed.data;
  throw new InputError(
    'not-a-curve',
    'This JSON file is neither a result nor a sweep. Give what the command line printed, or the sweep itself.',
    file,
  );
}
