import { Writable } from 'node:stream';
import { brotliDecompressSync } from 'node:zlib';
import pg from 'pg';
import { pino } from 'pino';
import { expect, inject, it } from 'vitest';
import type { Problem } from '../../shared/contracts/problem.js';
import { startApp } from './support/app.js';
import { makeClientFiles } from './support/client-files.js';
import { makePerson } from './support/people.js';

const lines: string[] = [];
const sink = new Writable({
  write(chunk, _encoding, done) {
    lines.push(String(chunk));
    done();
  },
});
const app = await startApp({ logger: pino({ base: null }, sink), clientDir: makeClientFiles() });
const { client, teamId } = await makePerson(app, 'Reader');
const logOf = (requestId: string | null) =>
  lines.map((line) => JSON.parse(line)).filter((line) => line.req?.id === requestId);

it('says that it lives, and that it is ready while the database is and has every migration', async () => {
  expect((await client.get('/api/health')).body).toEqual({ status: 'alive' });
  expect((await client.get('/api/ready')).body).toEqual({ status: 'ready' });
  const other = await startApp();
  await other.dataSource.query('DELETE FROM migration');
  const behind = await other.client().get<Problem>('/api/ready');
  expect([behind.status, behind.body.code]).toEqual([503, 'not-ready']);
});

it('lives on without its database, says that it is not ready, and recovers by itself', async () => {
  const other = await startApp();
  const person = await makePerson(other, 'Patient');
  const [{ name }] = await other.dataSource.query('SELECT current_database() AS name');
  const admin = new pg.Client(inject('clusterUrl'));
  await admin.connect();
  await admin.query(`ALTER DATABASE ${name} ALLOW_CONNECTIONS false`);
  await admin.query('SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = $1', [name]);
  expect((await person.client.get('/api/health')).status).toBe(200);
  const away = await person.client.get<Problem>('/api/ready');
  expect([away.status, away.body.code]).toEqual([503, 'not-ready']);
  const me = await person.client.get<Problem>('/api/me');
  expect([me.status, me.body.code]).toEqual([503, 'not-ready']);
  await admin.query(`ALTER DATABASE ${name} ALLOW_CONNECTIONS true`);
  await admin.end();
  expect((await person.client.get('/api/me')).status).toBe(200);
});

it('logs each request once as JSON, with the id that the answer carries', async () => {
  const answer = await client.get<Problem>('/api/nowhere');
  const id = answer.headers.get('x-request-id');
  expect(id).toMatch(/^[0-9a-f-]{36}$/);
  expect(answer.body.requestId).toBe(id);
  expect(logOf(id)).toMatchObject([{ level: 40, req: { method: 'GET', url: '/api/nowhere' }, res: { status: 404 } }]);
});

it('keeps cookies, passwords, tokens and the codes of letters out of the log', async () => {
  const from = lines.length;
  await client.get('/api/me', { authorization: 'Bearer hush' });
  await client.post('/api/account/refresh');
  await app.client().post('/api/account/sign-in', { email: 'x@example.test', password: 'hush hush hush' });
  await app.client().get('/verify/a-code-that-opens-something');
  await app.client().get('/reset/a-code-that-opens-something?x=1');
  const log = lines.slice(from).join('');
  expect(log).toContain('/verify/[code]');
  expect(log).toContain('/reset/[code]?x=1');
  expect(log).not.toMatch(/hush|a-code-that-opens/);
  for (const { value } of client.cookies.values()) expect(log).not.toContain(value);
});

it.each([
  ['broken JSON', '{"name":', 400, 'validation-failed'],
  ['an empty text', ' ', 400, 'validation-failed'],
  ['a bare number', '7', 400, 'validation-failed'],
  ['arrays nested ten thousand deep', `{"name":${'['.repeat(10_000)}${']'.repeat(10_000)}}`, 400, 'validation-failed'],
  ['an own prototype', '{"__proto__":{"isInvented":true},"name":"x"}', 400, 'validation-failed'],
  ['more than is taken', `{"note":"${'x'.repeat(17_000_000)}"}`, 413, 'too-large'],
])('refuses %s without a stack trace', async (_, body, status, code) => {
  const answer = await client.send<Problem>('POST', `/api/teams/${teamId}/projects`, body);
  expect([answer.status, answer.body.code]).toEqual([status, code]);
  expect(new TextDecoder().decode(answer.bytes)).not.toMatch(/\\n +at |\.ts|node_modules/);
  expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
});

it('takes only little from somebody who is not signed in', async () => {
  const answer = await app.client().post<Problem>('/api/account/sign-in', { email: 'x'.repeat(40_000), password: 'x' });
  expect([answer.status, answer.body.code]).toEqual([413, 'too-large']);
});

it('answers a fault of its own with a reference and no detail, and logs the stack', async () => {
  const broken = await startApp({ logger: pino({ base: null }, sink) });
  await broken.dataSource.query('ALTER TABLE person RENAME TO someone');
  const answer = await broken
    .client()
    .post<Problem>('/api/account/sign-in', { email: 'a@example.test', password: 'x' });
  expect([answer.status, answer.body.code]).toEqual([500, 'internal-error']);
  expect(JSON.stringify(answer.body)).not.toMatch(/person|relation|SELECT/i);
  const logged = lines
    .map((line) => JSON.parse(line))
    .find(({ msg, req }) => msg === 'not foreseen' && req?.id === answer.body.requestId);
  expect(logged.err.stack).toContain('relation "person" does not exist');
});

it('serves hashed files for ever, other files with a check, and every page as index.html', async () => {
  const script = await client.get('/assets/main-4f2a.js');
  expect(script.headers.get('cache-control')).toBe('public, max-age=31536000, immutable');
  expect((await client.get('/icon.svg')).headers.get('cache-control')).toBe('no-cache');
  for (const path of ['/', '/home', '/p/x/sheet/y', '/verify/abc']) {
    const page = await client.get(path);
    expect([page.status, page.headers.get('cache-control')]).toEqual([200, 'no-store']);
    expect(new TextDecoder().decode(page.bytes)).toContain('Hummock');
  }
  for (const path of ['/assets/gone-1234.js', '/gone.png']) {
    const missing = await client.get(path);
    expect([missing.status, missing.headers.get('content-type')]).toEqual([404, 'text/plain; charset=utf-8']);
  }
});

it('compresses what is worth it', async () => {
  const { hostname, port } = new URL(app.url);
  const { request } = await import('node:http');
  const [encoding, bytes] = await new Promise<[string | undefined, Buffer]>((resolve, reject) => {
    const asked = request(
      { hostname, port, path: '/assets/main-4f2a.js', headers: { 'accept-encoding': 'br' } },
      (response) => {
        const parts: Buffer[] = [];
        response.on('data', (part) => parts.push(part));
        response.on('end', () => resolve([response.headers['content-encoding'], Buffer.concat(parts)]));
      },
    );
    asked.on('error', reject).end();
  });
  expect(encoding).toBe('br');
  expect(bytes.length).toBeLessThan(500);
  expect(brotliDecompressSync(bytes).toString()).toContain('Re fs Qts Vas');
});

it('counts requests by route for this machine alone', async () => {
  await client.get('/api/me');
  const page = new TextDecoder().decode((await client.get('/metrics')).bytes);
  expect(page).toMatch(/hummock_request_seconds_count\{method="GET",route="GET \/api\/me",status="200"\} \d+/);
  expect(page).not.toContain(teamId);
  const forwarded = await client.get('/metrics', { 'x-forwarded-for': '203.0.113.9' });
  expect(new TextDecoder().decode(forwarded.bytes)).not.toContain('hummock_request_seconds');
});
