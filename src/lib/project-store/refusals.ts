import { AlreadyHereSchema } from '../../../shared/contracts/sweep.js';
import { InputError } from '../../../shared/errors.js';
import { ApiError } from '../api-error.js';

/** Why a file was refused, whichever store refused it. */
export function refusalOf(error: unknown): InputError | undefined {
  if (error instanceof InputError) return error;
  return error instanceof ApiError && error.code === 'file-refused' ? error.inputError : undefined;
}

/** The sweep that has this file already. */
export function alreadyHere(error: unknown): { sweepId: string; name: string } | undefined {
  if (!(error instanceof ApiError) || error.code !== 'already-here') return undefined;
  return AlreadyHereSchema.safeParse(error.extra).data;
}
