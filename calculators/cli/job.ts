import { z } from 'zod';
import { InputError } from '../../shared/errors.js';
import type { Output } from '../../shared/output.js';
import { calculatorById, calculators } from '../index.js';
import type { RoleInput } from '../kit/calculator.js';
import { runCalculator, SILENT_CONTEXT } from '../kit/run.js';
import { loadInput } from './inputs.js';
import { READ_VERSION, readJob } from './read-job.js';

/** One job as a line of a file of jobs holds it. What stands beside role and file in an input is a key of the role. */
export const JobSchema = z.strictObject({
  id: z.unknown().optional(),
  calculator: z.string().min(1),
  inputs: z.array(z.looseObject({ role: z.string().min(1), file: z.string().min(1) })).default([]),
  settings: z.record(z.string(), z.unknown()).default({}),
  traces: z.boolean().default(false),
});
export type Job = z.output<typeof JobSchema>;

export type Answer = Readonly<Record<string, unknown>>;

/** Runs one job. Whatever is wrong with its files or settings becomes `{ error }`, never an exception. */
export function answer(job: Job, besides?: string): Answer {
  const id = job.id === undefined ? {} : { id: job.id };
  try {
    return { ...id, ...run(job, besides) };
  } catch (error) {
    return { ...id, error: errorOf(error, job.calculator) };
  }
}

function run(job: Job, besides?: string): Answer {
  if (job.calculator === 'read') return { calculator: 'read', version: READ_VERSION, ...readJob(job, besides) };
  const definition = calculatorById(job.calculator);
  if (!definition) {
    const known = ['read', ...calculators.map((calculator) => calculator.id)].join(', ');
    throw new InputError('bad-setting', `There is no calculator ${job.calculator}. There are: ${known}.`, 'calculator');
  }
  const inputs: Record<string, RoleInput[]> = {};
  for (const { role, file, ...keys } of job.inputs) {
    if (!Object.hasOwn(inputs, role)) inputs[role] = [];
    inputs[role]?.push(loadInput({ role, file, keys, besides }));
  }
  const output = runCalculator(definition, inputs, job.settings, SILENT_CONTEXT);
  return { calculator: definition.id, version: definition.version, ...plain(output, job.traces) };
}

function plain(output: Output, withTraces: boolean): Answer {
  const { traces, ...rest } = output;
  if (!withTraces) return rest;
  const list = (curve: ArrayLike<number> | undefined) => curve && { list: Array.from(curve) };
  return {
    ...rest,
    traces: traces.map(({ x, y, re, im, ...trace }) => ({
      ...trace,
      x: Array.from(x),
      ...(y ? { y: list(y)?.list } : {}),
      ...(re ? { re: list(re)?.list } : {}),
      ...(im ? { im: list(im)?.list } : {}),
    })),
  };
}

/** A typed error as it is; a defect of the program without its stack. */
export function errorOf(error: unknown, where: string) {
  if (error instanceof InputError) return error.toJSON();
  const reason = error instanceof Error ? error.message : String(error);
  return {
    code: 'internal-error',
    message: `The calculation broke off: ${reason}. Please report it with this file.`,
    where,
  };
}
