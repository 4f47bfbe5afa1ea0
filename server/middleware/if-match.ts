import type { Request } from 'express';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

/** The version an edit started from: `If-Match: "7"`. An edit without one is refused. */
export function versionOf(request: Request): number {
  const version = optionalVersionOf(request);
  if (version === undefined) throw new AppError('version-missing', text.server.versionMissing);
  return version;
}

/** Deleting and restoring may leave it out: then whatever version is there is meant. */
export function optionalVersionOf(request: Request): number | undefined {
  const header = request.get('if-match');
  if (header === undefined || header === '*') return undefined;
  const [, digits] = /^(?:W\/)?"(\d{1,9})"$/.exec(header) ?? [];
  if (digits === undefined) throw new AppError('version-missing', text.server.versionMissing);
  return Number(digits);
}
