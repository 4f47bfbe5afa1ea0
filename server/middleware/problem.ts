import type { ErrorRequestHandler, RequestHandler } from 'express';
import { QueryFailedError } from 'typeorm';
import { ZodError } from 'zod';
import type { Problem } from '../../shared/contracts/problem.js';
import { AppError, ERROR_STATUS, InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

const MEGABYTE = 1_048_576;

interface Refusal {
  error: AppError;
  issues?: Problem['issues'];
}

/** What the JSON parser of Express refuses, by the `type` it gives its errors. */
const UNREADABLE = new Set([
  'entity.parse.failed',
  'encoding.unsupported',
  'charset.unsupported',
  'request.aborted',
  'request.size.invalid',
]);
/** SQLSTATE of a text that PostgreSQL cannot hold: the character of code 0, or half of a pair. */
const UNSTORABLE = new Set(['22021', '22P05', '22P02']);

/** The database is away: no connection, or one that was ended (SQLSTATE 57P01 to 57P03, 53300, 55000). */
const AWAY = new Set(['ECONNREFUSED', 'ECONNRESET', 'ETIMEDOUT', '57P01', '57P02', '57P03', '53300', '55000']);

function databaseCodeOf(error: unknown): string {
  const own = error instanceof QueryFailedError ? error.driverError : error;
  return String((own as { code?: unknown } | undefined)?.code ?? '');
}

function refusalOf(error: unknown): Refusal {
  if (error instanceof AppError) {
    const { issues, ...detail } = error.detail; // a service that knows the field says so
    if (!Array.isArray(issues)) return { error };
    return { error: new AppError(error.code, error.message, detail, error.cause), issues };
  }
  if (error instanceof InputError)
    return { error: new AppError('file-refused', error.message, { ...error.toJSON() }, error) };
  if (error instanceof ZodError) {
    const issues = error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message }));
    return { error: new AppError('validation-failed', text.server.validationFailed(issues.length), {}, error), issues };
  }
  if (error instanceof URIError) return { error: new AppError('not-found', text.server.notFound, {}, error) };
  const code = databaseCodeOf(error);
  if (AWAY.has(code)) return { error: new AppError('not-ready', text.server.notReady, {}, error) };
  if (error instanceof QueryFailedError && UNSTORABLE.has(code)) {
    return { error: new AppError('validation-failed', text.server.textUnstorable, {}, error) };
  }
  const type = (error as { type?: string } | undefined)?.type;
  if (type === 'entity.too.large') {
    const bytes = (error as { limit?: number }).limit ?? 0;
    const limit = bytes < MEGABYTE ? `${Math.round(bytes / 1024)} kB` : `${Math.round(bytes / MEGABYTE)} MB`;
    return { error: new AppError('too-large', text.server.tooLarge(limit), {}, error) };
  }
  if (type !== undefined && UNREADABLE.has(type)) {
    return { error: new AppError('validation-failed', text.server.bodyUnreadable, {}, error) };
  }
  return { error: new AppError('internal-error', text.server.internalError, {}, error) };
}

/** Turns whatever a route threw into problem details (RFC 9457); what was not foreseen is logged with its stack. */
export function problemAnswer(): ErrorRequestHandler {
  return (thrown: unknown, request, response, next) => {
    const { error, issues } = refusalOf(thrown);
    if (error.code === 'internal-error' || error.code === 'not-ready')
      request.log.error({ err: thrown }, 'not foreseen');
    if (response.headersSent) return next(thrown); // Express then ends the connection
    const problem: Problem = {
      type: `/help/errors#${error.code}`,
      title: text.errors.titles[error.code],
      status: ERROR_STATUS[error.code],
      code: error.code,
      detail: error.message,
      requestId: String(request.id),
      ...(issues && { issues }),
      ...(Object.keys(error.detail).length > 0 && { extra: error.detail }),
    };
    if (typeof error.detail.waitSeconds === 'number') response.set('Retry-After', String(error.detail.waitSeconds));
    response.status(problem.status).set('Cache-Control', 'no-store').type('application/problem+json');
    response.send(JSON.stringify(problem));
  };
}

export function noSuchRoute(): RequestHandler {
  return () => {
    throw new AppError('not-found', text.server.noRoute);
  };
}
