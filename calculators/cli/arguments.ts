/** Wrong usage: one line on standard error, exit status 2. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

export interface Assignment {
  readonly name: string;
  readonly text: string;
}
export interface Arguments {
  readonly command: string;
  readonly rest: readonly string[]; // what is no option
  readonly inputs: readonly Assignment[]; // --in ROLE=FILE
  readonly set: readonly Assignment[]; // --set NAME=VALUE
  readonly settingsFile?: string | undefined;
  readonly reading?: string | undefined; // JSON
  readonly traces: boolean;
}

export const USAGE =
  'Usage: calculate list | read FILE [--reading JSON] | CALCULATOR --in ROLE=FILE[?key=value&…] … [--set NAME=VALUE …] [--settings FILE] [--traces] | jobs FILE.ndjson';

/** Parts the words of the command line; both `--set NAME=VALUE` and `--set=NAME=VALUE` are understood. */
export function parseArguments(words: readonly string[]): Arguments {
  const [command, ...others] = words;
  if (!command || command.startsWith('-')) throw new UsageError(USAGE);
  const rest: string[] = [];
  const inputs: Assignment[] = [];
  const set: Assignment[] = [];
  const single = new Map<string, string>();
  let traces = false;
  for (let i = 0; i < others.length; i += 1) {
    const word = others[i] as string;
    if (!word.startsWith('--')) {
      rest.push(word);
      continue;
    }
    const [option = '', inline] = splitOnce(word, '=');
    if (option === '--traces' && inline === undefined) {
      traces = true;
      continue;
    }
    const value = inline ?? others[++i];
    if (!KNOWN.has(option)) throw new UsageError(`There is no option ${option}. ${USAGE}`);
    if (value === undefined) throw new UsageError(`The option ${option} needs a value. ${USAGE}`);
    if (option === '--in') inputs.push(assignment(option, value, 'ROLE=FILE'));
    else if (option === '--set') set.push(assignment(option, value, 'NAME=VALUE'));
    else single.set(option, value);
  }
  return {
    command,
    rest,
    inputs,
    set,
    traces,
    settingsFile: single.get('--settings'),
    reading: single.get('--reading'),
  };
}

const KNOWN = new Set(['--in', '--set', '--settings', '--reading']);

function assignment(option: string, value: string, form: string): Assignment {
  const [name, text] = splitOnce(value, '=');
  if (!name || text === undefined || text === '') throw new UsageError(`${option} takes ${form}, not “${value}”.`);
  return { name, text };
}

export function splitOnce(text: string, mark: string): [string, string | undefined] {
  const at = text.indexOf(mark);
  return at < 0 ? [text, undefined] : [text.slice(0, at), text.slice(at + mark.length)];
}

/** JSON where it parses, else the text itself. */
export function jsonOrText(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return text;
  }
}

/** Puts a value under a dotted name: air.temperature becomes { air: { temperature } }. */
export function assign(settings: Record<string, unknown>, { name, text }: Assignment): void {
  const path = name.split('.');
  const last = path.pop() as string;
  let at = settings;
  for (const step of [...path, last]) {
    if (step === '' || step === '__proto__') throw new UsageError(`--set cannot name a setting “${name}”.`);
  }
  for (const step of path) {
    const next = Object.hasOwn(at, step) ? at[step] : undefined;
    const isNested = typeof next === 'object' && next !== null && !Array.isArray(next);
    at[step] = isNested ? { ...next } : {};
    at = at[step] as Record<string, unknown>;
  }
  at[last] = jsonOrText(text);
}
