import { AlreadyHereSchema } from '../../../shared/contracts/sweep.js';
import { ApiError } from '../api-error.js';

/** The sweep that has this file already. */
export function alreadyHere(error: unknown): { sweepId: string; name: string } | undefined {
  if (!(error instanceof ApiError) || error.code !== 'already-here') return undefined;
  return AlreadyHereSchema.safeParse(error.extra).data;
}
