import { expect, it } from 'vitest';
import type { Problem } from '../../shared/contracts/problem.js';
import { startApp } from '../api/support/app.js';
import { Client } from '../api/support/client.js';
import { makePerson } from '../api/support/people.js';

const app = await startApp();
const person = await makePerson(app, 'Victim');
const path = `/api/teams/${person.teamId}/projects`;
const own = app.url;

/** The victim's cookies, sent by a page that is told by these headers. */
async function tryWith(headers: Record<string, string>, method = 'POST'): Promise<[number, string | undefined]> {
  const cookie = [...person.client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const body = method === 'POST' ? JSON.stringify({ name: 'Forged' }) : undefined;
  const answer = await fetch(`${own}${path}`, {
    method,
    headers: { cookie, 'content-type': 'application/json', ...headers },
    ...(body && { body }),
  });
  const problem = answer.ok ? undefined : ((await answer.json()) as Problem);
  return [answer.status, problem?.code];
}

it.each([
  ['another site', { origin: 'https://elsewhere.example' }],
  ['an opaque origin', { origin: 'null' }],
  ['another port of this host', { origin: 'http://127.0.0.1:1' }],
  ['this host by TLS only in name', { origin: 'https://127.0.0.1.elsewhere.example' }],
  ['a page that the browser calls cross-site', { origin: own, 'sec-fetch-site': 'cross-site' }],
  ['a page of a neighbour domain', { origin: own, 'sec-fetch-site': 'same-site' }],
  ['the address bar', { 'sec-fetch-site': 'none' }],
  [
    'another site that claims same-origin by mistake',
    { origin: 'https://elsewhere.example', 'sec-fetch-site': 'same-origin' },
  ],
  ['nobody: no proof at all', {}],
  ['a page that only the Referer names', { referer: `${own}/home` }],
])('refuses a change from %s', async (_, headers) => {
  expect(await tryWith(headers)).toEqual([403, 'cross-site']);
});

it('accepts a change with the origin of the server itself, or the browser’s word for it', async () => {
  expect((await tryWith({ origin: own }))[0]).toBe(201);
  expect((await tryWith({ 'sec-fetch-site': 'same-origin' }))[0]).toBe(201);
  expect((await tryWith({ origin: own, 'sec-fetch-site': 'same-origin' }))[0]).toBe(201);
});

it('accepts the public origin where a proxy hides it from the host header', async () => {
  const behind = await startApp({ publicUrl: () => 'https://hummock.example' });
  const answer = await new Client(behind.url, { origin: 'https://hummock.example' }).post('/api/account/sign-out');
  expect(answer.status).toBe(204);
});

it('reads for a link from elsewhere, since reading changes nothing', async () => {
  expect((await tryWith({ 'sec-fetch-site': 'cross-site' }, 'GET'))[0]).toBe(200);
});

it('protects signing in too, so that nobody can be signed in as somebody else', async () => {
  const stranger = new Client(own, { origin: 'https://elsewhere.example' });
  const answer = await stranger.post<Problem>('/api/account/sign-in', { email: person.me.email, password: 'x' });
  expect([answer.status, answer.body.code]).toEqual([403, 'cross-site']);
});

it('does not take a form that a plain page can send for JSON', async () => {
  const asText = { origin: own, 'content-type': 'text/plain' };
  const answer = await person.client.send<Problem>('POST', path, '{"name":"Forged"}', asText);
  expect([answer.status, answer.body.code]).toEqual([400, 'validation-failed']);
});

it('lets no other site read an answer', async () => {
  const { headers } = await person.client.get('/api/me', { origin: 'https://elsewhere.example' });
  expect([...headers.keys()].filter((name) => name.startsWith('access-control'))).toEqual([]);
});
