import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { api } from '../../../../src/lib/api.js';
import { ApiError } from '../../../../src/lib/api-error.js';
import { session } from '../../../../src/lib/session.js';

type Handler = (url: string, init: RequestInit) => Response | Promise<Response>;
let answer: Handler;
const calls: { url: string; init: RequestInit }[] = [];

const json = (status: number, body: unknown) => new Response(JSON.stringify(body), { status });
const problem = (status: number, code: string, extra: object = {}) =>
  json(status, {
    type: 'about:blank',
    title: code,
    status,
    code,
    detail: `about ${code}`,
    requestId: 'r-17',
    ...extra,
  });
const Value = z.object({ value: z.number() });

beforeEach(() => {
  calls.length = 0;
  session.signedOut();
  vi.stubGlobal('fetch', async (url: string, init: RequestInit) => {
    calls.push({ url, init });
    return answer(url, init);
  });
});
afterEach(() => vi.unstubAllGlobals());

const codeOf = async (work: Promise<unknown>) => {
  const error = await work.then(
    () => undefined,
    (reason: unknown) => reason,
  );
  return error instanceof ApiError ? error : undefined;
};

it('parses an answer with its contract', async () => {
  answer = () => json(200, { value: 7, other: true });
  expect(await api.get('/thing', Value)).toEqual({ value: 7 });
});

it('calls an answer of another shape odd instead of passing it on', async () => {
  answer = () => json(200, { value: 'seven' });
  expect((await codeOf(api.get('/thing', Value)))?.code).toBe('odd-answer');
});

it('turns problem details into an error with its code, fields and reference', async () => {
  answer = () => problem(400, 'validation-failed', { issues: [{ path: 'name', message: 'This is needed.' }] });
  const error = await codeOf(api.post('/thing', {}, Value));
  expect(error).toMatchObject({ code: 'validation-failed', status: 400, requestId: 'r-17' });
  expect(error?.issues).toEqual([{ path: 'name', message: 'This is needed.' }]);
});

it('says that there is no connection when the server cannot be reached', async () => {
  answer = () => {
    throw new TypeError('Failed to fetch');
  };
  expect((await codeOf(api.get('/thing', Value)))?.code).toBe('offline');
});

it('sends the version that was edited as If-Match', async () => {
  answer = () => json(200, { value: 1 });
  await api.patch('/thing', {}, Value, { version: 12 });
  expect(new Headers(calls[0]?.init.headers).get('if-match')).toBe('"12"');
});

it('refreshes an ended session once for all requests that meet it together', async () => {
  let isFresh = false;
  answer = (url) => {
    if (url === '/api/account/refresh') {
      isFresh = true;
      return json(200, {});
    }
    return isFresh ? json(200, { value: 3 }) : problem(401, 'not-signed-in');
  };
  const answers = await Promise.all([api.get('/a', Value), api.get('/b', Value), api.get('/c', Value)]);
  expect(answers.map(({ value }) => value)).toEqual([3, 3, 3]);
  expect(calls.filter(({ url }) => url === '/api/account/refresh')).toHaveLength(1);
});

it('asks a person whose session ended to sign in again, and goes on with the request afterwards', async () => {
  session.signedIn();
  let isSignedIn = false;
  answer = (url) => {
    if (url === '/api/account/refresh') return problem(401, 'session-ended');
    return isSignedIn ? json(200, { value: 5 }) : problem(401, 'not-signed-in');
  };
  const waiting = api.get('/thing', Value);
  await vi.waitFor(() => expect(calls).toHaveLength(2));
  await new Promise((resolve) => setTimeout(resolve));
  isSignedIn = true;
  session.signedIn();
  expect(await waiting).toEqual({ value: 5 });
});

it('gives the request up when the person leaves instead of signing in again', async () => {
  session.signedIn();
  answer = () => problem(401, 'not-signed-in');
  const waiting = codeOf(api.get('/thing', Value));
  await vi.waitFor(() => expect(calls).toHaveLength(2));
  await new Promise((resolve) => setTimeout(resolve));
  session.signedOut();
  expect((await waiting)?.code).toBe('not-signed-in');
});

it('takes an old hint back without asking, when nobody was signed in on this page', async () => {
  localStorage.setItem('hummock.signed-in', 'yes');
  vi.resetModules();
  const { api: freshApi } = await import('../../../../src/lib/api.js');
  const { session: freshSession } = await import('../../../../src/lib/session.js');
  expect(freshSession.hint).toBe(true);
  answer = () => problem(401, 'not-signed-in');
  await expect(freshApi.get('/thing', Value)).rejects.toMatchObject({ code: 'not-signed-in' });
  expect(freshSession.hint).toBe(false);
});

it('never tries to refresh for the account routes themselves', async () => {
  answer = () => problem(401, 'sign-in-failed');
  expect((await codeOf(api.post('/account/sign-in', {}, Value)))?.code).toBe('sign-in-failed');
  expect(calls).toHaveLength(1);
});
