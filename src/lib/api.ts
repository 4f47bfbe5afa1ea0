import type { z } from 'zod';
import { type ApiError, ownError } from './api-error.js';
import { problemToError } from './problem-to-error.js';
import { session } from './session.js';
import { sendForm, type UploadOptions } from './upload.js';

export interface RequestOptions {
  signal?: AbortSignal;
  /** The version that was edited: another one on the server is refused with `version-conflict`. */
  version?: number;
  /** Goes through even if the page is left meanwhile. For small things only. */
  keepalive?: boolean;
}

const SIGNED_OUT = new Set(['not-signed-in', 'session-ended']);
let refreshing: Promise<boolean> | undefined;

/** One refresh for all requests that meet an ended access token at the same time. */
function refreshOnce(): Promise<boolean> {
  refreshing ??= fetch('/api/account/refresh', { method: 'POST', credentials: 'same-origin' })
    .then((answer) => answer.ok)
    .catch(() => false)
    .finally(() => {
      refreshing = undefined;
    });
  return refreshing;
}

/** Runs `attempt`; where the session has ended, refreshes it once, or lets the person sign in over the page. */
async function withSession<T>(attempt: () => Promise<T>, isAccountRoute: boolean): Promise<T> {
  try {
    return await attempt();
  } catch (error) {
    if (isAccountRoute || !SIGNED_OUT.has((error as ApiError).code)) throw error;
    if (await refreshOnce()) return attempt();
    if (!session.hint) throw error;
    if (await session.ended()) return attempt();
    throw error;
  }
}

async function send(method: string, path: string, body: unknown, options: RequestOptions): Promise<Response> {
  const headers = new Headers({ accept: 'application/json' });
  if (body !== undefined) headers.set('content-type', 'application/json');
  if (options.version !== undefined) headers.set('if-match', `"${options.version}"`);
  const init: RequestInit = { method, headers, credentials: 'same-origin' };
  if (body !== undefined) init.body = JSON.stringify(body);
  if (options.keepalive) init.keepalive = true;
  if (options.signal) init.signal = options.signal;
  const answer = await fetch(`/api${path}`, init).catch((error: unknown) => {
    if (options.signal?.aborted) throw error;
    throw ownError('offline', error);
  });
  if (answer.ok) return answer;
  throw problemToError(answer.status, await answer.json().catch(() => undefined));
}

function request(method: string, path: string, body: unknown, options: RequestOptions): Promise<Response> {
  return withSession(() => send(method, path, body, options), path.startsWith('/account/'));
}

/** An answer of another shape than agreed is an error here, not a surprise on the screen. */
function parse<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw ownError('odd-answer', parsed.error);
}

async function json<Schema extends z.ZodType>(answer: Promise<Response>, schema: Schema): Promise<z.output<Schema>> {
  const response = await answer;
  return parse(schema, response.status === 204 ? undefined : await response.json().catch(() => undefined));
}

/** The server's API. Paths are those below `/api`; every answer is parsed with its contract. */
export const api = {
  get: <S extends z.ZodType>(path: string, schema: S, options: RequestOptions = {}) =>
    json(request('GET', path, undefined, options), schema),
  post: <S extends z.ZodType>(path: string, body: unknown, schema: S, options: RequestOptions = {}) =>
    json(request('POST', path, body, options), schema),
  patch: <S extends z.ZodType>(path: string, body: unknown, schema: S, options: RequestOptions = {}) =>
    json(request('PATCH', path, body, options), schema),
  delete: async (path: string, options: RequestOptions = {}): Promise<void> => {
    await request('DELETE', path, undefined, options);
  },
  bytes: async (path: string, options: RequestOptions = {}): Promise<Uint8Array> => {
    const answer = await request('GET', path, undefined, options);
    return new Uint8Array(await answer.arrayBuffer());
  },
  upload: async <S extends z.ZodType>(path: string, form: FormData, schema: S, options: UploadOptions = {}) =>
    parse(schema, await withSession(() => sendForm(`/api${path}`, form, options), false)),
};
