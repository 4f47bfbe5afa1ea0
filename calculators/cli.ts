import { readFileSync } from 'node:fs';
import { type Arguments, assign, parseArguments, USAGE, UsageError } from './cli/arguments.js';
import { splitKeys } from './cli/inputs.js';
import { type Answer, answer, type Job } from './cli/job.js';
import { runJobs } from './cli/jobs.js';
import { list } from './cli/list.js';
import { locate } from './cli/paths.js';
import { calculatorById } from './index.js';

/** The calculators without browser or database. Exit status: 0 done, 1 an input that cannot be used, 2 wrong usage. */
async function main(words: readonly string[]): Promise<number> {
  const args = parseArguments(words);
  if (args.command === 'list') return print(list());
  if (args.command === 'jobs') {
    const [file, more] = args.rest;
    if (!file || more) throw new UsageError(`jobs takes one file. ${USAGE}`);
    await runJobs(file, process.stdout);
    return 0;
  }
  if (args.command !== 'read' && !calculatorById(args.command)) {
    throw new UsageError(`There is no command or calculator ${args.command}. ${USAGE}`);
  }
  return print(answer(jobOf(args)));
}

function jobOf(args: Arguments): Job {
  const isRead = args.command === 'read';
  const inputs = args.inputs.map(({ name, text }) => {
    const { file, keys } = splitKeys(text);
    return { ...keys, role: name, file };
  });
  if (isRead) for (const file of args.rest) inputs.push({ role: 'sweep', file });
  else if (args.rest.length > 0) throw new UsageError(`${args.rest[0]} stands without --in ROLE=. ${USAGE}`);
  if (isRead && inputs.length === 0) throw new UsageError(`read needs a file. ${USAGE}`);
  if (!isRead && args.reading !== undefined) throw new UsageError('--reading belongs to read.');
  const settings = args.settingsFile === undefined ? {} : settingsIn(args.settingsFile);
  for (const assignment of args.set) assign(settings, assignment);
  if (args.reading !== undefined) settings.reading = parsed(args.reading, '--reading');
  return { calculator: args.command, inputs, settings, traces: args.traces };
}

function settingsIn(name: string): Record<string, unknown> {
  let text: string;
  try {
    text = readFileSync(locate(name), 'utf8');
  } catch {
    throw new UsageError(`The file of settings ${name} cannot be opened.`);
  }
  const settings = parsed(text, name);
  if (typeof settings === 'object' && settings !== null && !Array.isArray(settings)) return { ...settings };
  throw new UsageError(`The file of settings ${name} has to hold one JSON object.`);
}

function parsed(text: string, where: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    throw new UsageError(`${where} is not JSON.`);
  }
}

function print(value: Answer | readonly Answer[]): number {
  process.stdout.write(`${JSON.stringify(value)}\n`);
  return 'error' in value ? 1 : 0;
}

process.stdout.on('error', () => process.exit(0)); // the reader of the output went away
try {
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  if (!(error instanceof UsageError)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 2;
}
