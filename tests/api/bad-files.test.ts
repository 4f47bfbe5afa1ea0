import { once } from 'node:events';
import { readdirSync, readFileSync } from 'node:fs';
import { type IncomingMessage, request } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { pipeline } from 'node:stream/promises';
import { expect, it } from 'vitest';
import type { Problem } from '../../shared/contracts/problem.js';
import type { SweepRow } from '../../shared/contracts/sweep.js';
import { startApp } from './support/app.js';
import { makeProject, tableOf, upload } from './support/measured.js';
import { makePerson } from './support/people.js';

interface BadFile {
  readonly file: string | null;
  readonly expect: 'error' | 'curve' | 'either';
  readonly error_kinds?: readonly string[];
  readonly warnings?: readonly string[];
  readonly points?: number;
}
/** Files that have to be refused or repaired, with what each has to be refused as (the data set's own truth). */
const FOLDER = 'tests/fixtures/text-dialects';
const { bad } = JSON.parse(readFileSync(join(FOLDER, 'truth.json'), 'utf8')) as { bad: BadFile[] };
const files = bad.filter((one): one is BadFile & { file: string } => one.file !== null);

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const projectId = await makeProject(mara);
const TABLES = ['source_file', 'source_chunk', 'sweep', 'sweep_revision', 'sweep_points'];

async function rows(): Promise<Record<string, number>> {
  const counts = TABLES.map(async (table) => {
    const [row] = await app.dataSource.query<{ n: number }[]>(`SELECT count(*)::int AS n FROM ${table}`);
    return [table, row!.n] as const;
  });
  return Object.fromEntries(await Promise.all(counts));
}
function temporaryFiles(): string[] {
  const mine = readdirSync(tmpdir()).filter((name) => name.startsWith(`hummock-uploads-${process.pid}-`));
  return mine.flatMap((folder) => readdirSync(join(tmpdir(), folder)));
}
async function send(fileName: string, content: Uint8Array | string) {
  return upload<Problem & { sweep: SweepRow }>(mara.client, projectId, content, { fileName });
}
/** What no answer may carry: where our code lies, or how it failed. */
const INSIDES = /node_modules|\.ts:\d|\.js:\d|\n\s+at |TypeError|RangeError|QueryFailed/;

it.each(files.filter((one) => one.expect === 'error').map((one) => [one.file, one] as const))(
  'refuses %s by its code, in words, and keeps nothing of it',
  async (file, { error_kinds = [] }) => {
    const before = await rows();
    const { status, body } = await send(file.split('/').at(-1)!, readFileSync(join(FOLDER, file)));
    expect(status).toBe(422);
    expect(body.code).toBe('file-refused');
    expect(body.extra).toMatchObject({ message: body.detail });
    // a recording cannot be read here yet: it is refused as one, before its channels are looked at
    const kinds = file.endsWith('.wav') ? ['wav-unsupported-encoding', ...error_kinds] : error_kinds;
    expect(kinds).toContain(body.extra?.code);
    expect(body.detail).toMatch(/^[A-Z].{15,}\.$/s);
    expect(JSON.stringify(body)).not.toMatch(INSIDES);
    expect(await rows()).toEqual(before);
    expect(temporaryFiles()).toEqual([]);
  },
);

it.each(files.filter((one) => one.expect === 'curve').map((one) => [one.file, one] as const))(
  'repairs %s, and says what it did',
  async (file, { points, warnings = [] }) => {
    const { status, body } = await send(file.split('/').at(-1)!, readFileSync(join(FOLDER, file)));
    expect(status).toBe(201);
    expect(body.sweep.revision.points).toBe(points);
    const codes = body.sweep.revision.findings.map(({ code }) => code);
    for (const warning of warnings) expect(codes).toContain(warning);
  },
);

/** Sends a file of `bytes` digits on a connection of its own, piece by piece and without saying how long it is. */
async function sendLong(bytes: number): Promise<{ status: number; body: Problem }> {
  const { hostname, port } = new URL(app.url);
  const cookie = [...mara.client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const headers = { cookie, origin: app.url, 'content-type': 'multipart/form-data; boundary=b' };
  const path = `/api/projects/${projectId}/sources`;
  const sending = request({ hostname, port, path, method: 'POST', headers, agent: false });
  const answered = once(sending, 'response') as Promise<[IncomingMessage]>;
  function* form() {
    yield '--b\r\ncontent-disposition: form-data; name="file"; filename="too-big.txt"\r\n\r\n';
    const piece = Buffer.alloc(2 ** 20, '1');
    for (let sent = 0; sent < bytes; sent += piece.length) yield piece.subarray(0, bytes - sent);
    yield '\r\n--b--\r\n';
  }
  await pipeline(form, sending);
  const [answer] = await answered;
  return { status: answer.statusCode ?? 0, body: JSON.parse(await text(answer)) as Problem };
}

it('refuses a file one byte over 64 MB while it streams, and keeps nothing of it', async () => {
  const before = await rows();
  const { status, body } = await sendLong(64 * 2 ** 20 + 1);
  expect([status, body.code]).toEqual([413, 'too-large']);
  expect(body.extra).toMatchObject({ code: 'file-too-large' });
  expect(await rows()).toEqual(before);
  expect(temporaryFiles()).toEqual([]);
}, 60_000);

it.each([
  ['comments with characters that a database cannot hold', `# a\u0000b \ud800\n${tableOf(9.1)}`],
  ['a header that looks like markup', `<script>alert(1)</script>\n${tableOf(9.2)}`],
  ['one line of a million commas', ','.repeat(1_000_000)],
  ['deep brackets', `${'['.repeat(100_000)}\n`],
  [
    'numbers beyond every range',
    `f,re,im\n${Array.from({ length: 20 }, (_, i) => `${i + 1}e300,1e308,-1e308`).join('\n')}`,
  ],
  ['only dots and signs', `${'+.-;'.repeat(5000)}\n`.repeat(3)],
])('answers %s with a sweep or a refusal, never with a fault of its own', async (_, content) => {
  const { status, body } = await send('odd.txt', content);
  expect([201, 422]).toContain(status);
  expect(JSON.stringify(body)).not.toMatch(INSIDES);
  expect(temporaryFiles()).toEqual([]);
});
