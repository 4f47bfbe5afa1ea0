import { createHash, randomUUID } from 'node:crypto';
import { readdirSync } from 'node:fs';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import { join as joinPath } from 'node:path';
import { expect, it } from 'vitest';
import { SourceFileEntity } from '../../server/database/entities/source-file.entity.js';
import { PostgresFileStore } from '../../server/files/postgres-file-store.js';
import { purgeSourceFiles } from '../../server/files/purge-source-files.js';
import type { Problem } from '../../shared/contracts/problem.js';
import { KnownSourcesAnswerSchema, SweepSchema } from '../../shared/contracts/sweep.js';
import { decodePoints } from '../../shared/points.js';
import { startApp } from './support/app.js';
import { makeProject, tableOf, upload, uploaded } from './support/measured.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client } = mara;
const projectId = await makeProject(mara);
const sha256 = (content: string | Uint8Array) => createHash('sha256').update(content).digest('hex');

function temporaryFiles(): string[] {
  const folders = readdirSync(tmpdir()).filter((name) => name.startsWith(`hummock-uploads-${process.pid}-`));
  return folders.flatMap((folder) => readdirSync(joinPath(tmpdir(), folder)));
}
async function rowsIn(table: string): Promise<number> {
  const [row] = await app.dataSource.query<{ n: number }[]>(`SELECT count(*)::int AS n FROM ${table}`);
  return row!.n;
}

it('keeps an uploaded file byte for byte, with its hash, its reading and its points', async () => {
  const content = `# bench 2, 3 March\r\n${tableOf(6.2).replaceAll('\n', '\r\n')}`;
  const conditions = { role: 'free-air', levelV: 0.1 } as const;
  const { status, body } = await upload(client, projectId, content, {
    fileName: 'Tieftöner 3 Ω.csv',
    sweep: { name: 'MW-03 free air', conditions, group: 'Lot of sixteen', tags: ['first'] },
  });
  expect(status).toBe(201);
  const sweep = SweepSchema.parse(body.sweep);
  expect(sweep).toMatchObject({ name: 'MW-03 free air', conditions, group: 'Lot of sixteen', tags: ['first'] });
  expect(sweep.source).toMatchObject({ fileName: 'Tieftöner 3 Ω.csv', bytes: Buffer.byteLength(content) });
  expect(sweep.source.sha256).toBe(sha256(content));
  expect(sweep.revision).toMatchObject({ number: 1, points: 24, hasPhase: true, minFrequencyHz: 20 });

  const file = await client.get(`/api/sources/${sweep.source.id}/content`);
  expect(Buffer.from(file.bytes).toString('utf8')).toBe(content);
  expect(file.headers.get('content-disposition')).toBe(
    `attachment; filename="Tieft_ner 3 _.csv"; filename*=UTF-8''Tieft%C3%B6ner%203%20%CE%A9.csv`,
  );
  expect(file.headers.get('x-content-type-options')).toBe('nosniff');
  expect(file.headers.get('content-type')).toBe('application/octet-stream');

  const points = await client.get(`/api/revisions/${sweep.revision.id}/points`);
  expect(sha256(points.bytes)).toBe(sweep.revision.pointsSha256);
  const { frequencyHz, realOhm } = decodePoints(points.bytes, 24, true);
  expect(frequencyHz[0]).toBe(20);
  expect(realOhm).toEqual(new Float64Array(24).fill(6.2));
  expect(temporaryFiles()).toEqual([]);
});

it('answers 304 for a file or points that the browser has', async () => {
  const { source, revision } = await uploaded(client, projectId, tableOf(6.3));
  const tag = `"${source.sha256}"`;
  expect((await client.get(`/api/sources/${source.id}/content`, { 'if-none-match': tag })).status).toBe(304);
  const known = await client.get(`/api/revisions/${revision.id}/points`, {
    'if-none-match': `"${revision.pointsSha256}"`,
  });
  expect(known.status).toBe(304);
  expect(known.headers.get('cache-control')).toContain('private');
});

it('takes the fields ahead of the file as well as after it', async () => {
  const form = new FormData();
  form.append('sweep', JSON.stringify({ name: 'Fields first', batchId: randomUUID() }));
  form.append('file', new Blob([tableOf(6.4)]), 'first.csv');
  const { status } = await client.send('POST', `/api/projects/${projectId}/sources`, form);
  expect(status).toBe(201);
});

it('recognises the same content, whatever it is called, and names the sweep that has it', async () => {
  const content = tableOf(6.5);
  const first = await uploaded(client, projectId, content, { sweep: { name: 'First' } });
  const again = await upload<Problem>(client, projectId, content, { fileName: 'other.txt', sweep: { name: 'Again' } });
  expect(again.status).toBe(409);
  expect(again.body).toMatchObject({ code: 'already-here', extra: { sweepId: first.id, name: 'First' } });

  const asked = [sha256(content), sha256('never seen')];
  const { body } = await client.post(`/api/projects/${projectId}/sources/known`, { sha256: asked });
  expect(KnownSourcesAnswerSchema.parse(body).known).toEqual([{ sha256: asked[0], sweepId: first.id, name: 'First' }]);
});

it('lets one of many uploads of the same file win, and tells the others which', async () => {
  const content = tableOf(6.6);
  const answers = await Promise.all(Array.from({ length: 6 }, () => upload(client, projectId, content)));
  expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409, 409, 409]);
  const winner = answers.find(({ status }) => status === 201)!.body.sweep;
  const told = answers.filter(({ status }) => status === 409).map(({ body }) => (body as unknown as Problem).extra);
  expect(told).toEqual(Array(5).fill({ sweepId: winner.id, name: 'A sweep' }));
  const [files] = await app.dataSource.query('SELECT count(*)::int AS n FROM source_file WHERE sha256 = $1', [
    sha256(content),
  ]);
  expect(files.n).toBe(1);
});

it('takes a file again whose sweep lies in the bin, and then keeps that one in the bin', async () => {
  const content = tableOf(6.7);
  const old = await uploaded(client, projectId, content);
  expect((await client.delete(`/api/sweeps/${old.id}`)).status).toBe(204);
  const fresh = await uploaded(client, projectId, content);
  expect(fresh.id).not.toBe(old.id);
  expect(fresh.source.id).toBe(old.source.id);
  const restored = await client.post<Problem>(`/api/sweeps/${old.id}/restore`);
  expect(restored.status).toBe(409);
  expect(restored.body.code).toBe('already-here');
});

it('refuses an item or a jig of another project, by field', async () => {
  const elsewhere = await makeProject(mara, 'Elsewhere');
  const item = await client.post(`/api/projects/${elsewhere}/items`, { kind: 'driver', name: 'MW-01' });
  const sweep = { itemId: String(item.body.id), conditions: { role: 'sweep' as const, jigItemId: randomUUID() } };
  const { status, body } = await upload<Problem>(client, projectId, tableOf(6.8), { sweep });
  expect(status).toBe(400);
  expect(body.issues?.map((issue) => issue.path)).toEqual(['itemId', 'conditions.jigItemId']);
});

it('refuses a form without a file, without a sweep, with two files and with unreadable fields', async () => {
  const path = `/api/projects/${projectId}/sources`;
  const sweep = JSON.stringify({ name: 'x', batchId: randomUUID() });
  const form = (...parts: [string, string | Blob][]) => {
    const made = new FormData();
    for (const [name, value] of parts) made.append(name, value);
    return made;
  };
  const file = new Blob([tableOf(6.9)]);
  const before = await rowsIn('source_file');
  const forms = [
    form(['sweep', sweep]),
    form(['file', file]),
    form(['file', file], ['file', file], ['sweep', sweep]),
    form(['file', file], ['sweep', '{"name":']),
    form(['file', file], ['sweep', JSON.stringify({ name: 'x', batchId: randomUUID(), points: [1, 2] })]),
    form(['other', file], ['sweep', sweep]),
  ];
  for (const sent of forms) {
    const { status, body } = await client.send('POST', path, sent);
    expect([status, body.code]).toEqual([400, 'validation-failed']);
  }
  const notAForm = await client.post(path, { name: 'x' });
  expect([notAForm.status, notAForm.body.code]).toEqual([400, 'validation-failed']);
  expect(await rowsIn('source_file')).toBe(before);
  expect(temporaryFiles()).toEqual([]);
});

it('refuses a file that declares too much before a byte of it is sent', async () => {
  const { hostname, port } = new URL(app.url);
  const cookie = [...client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const headers = {
    cookie,
    origin: app.url,
    'content-type': 'multipart/form-data; boundary=b',
    'content-length': String(200 * 2 ** 20),
  };
  const path = `/api/projects/${projectId}/sources`;
  const began = performance.now();
  const answered = await new Promise<{ status: number; body: string }>((resolve, reject) => {
    const sending = request({ hostname, port, path, method: 'POST', headers }, (answer) => {
      answer.setEncoding('utf8');
      let body = '';
      answer.on('data', (piece: string) => {
        body += piece;
        if (body.endsWith('}')) resolve({ status: answer.statusCode ?? 0, body });
      });
    });
    sending.on('error', reject);
    sending.flushHeaders(); // not one byte of the body
    setTimeout(() => sending.destroy(), 3_000).unref();
  });
  expect(performance.now() - began).toBeLessThan(2_000);
  expect(answered.status).toBe(413);
  expect(JSON.parse(answered.body)).toMatchObject({ code: 'too-large', extra: { code: 'file-too-large' } });
});

it('keeps nothing of an upload whose sender goes away', async () => {
  const before = await rowsIn('sweep');
  const leaving = new AbortController();
  const half = new ReadableStream<Uint8Array>({
    async start(controller) {
      const text = `--b\r\ncontent-disposition: form-data; name="file"; filename="half.csv"\r\n\r\n${tableOf(7)}`;
      controller.enqueue(new TextEncoder().encode(text));
      setTimeout(() => leaving.abort(), 100);
    },
  });
  const cookie = [...client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const sending = fetch(`${app.url}/api/projects/${projectId}/sources`, {
    method: 'POST',
    headers: { cookie, origin: app.url, 'content-type': 'multipart/form-data; boundary=b' },
    body: half,
    signal: leaving.signal,
    duplex: 'half',
  } as RequestInit);
  await expect(sending).rejects.toThrow();
  await expect.poll(temporaryFiles, { timeout: 15_000 }).toEqual([]);
  expect(await rowsIn('sweep')).toBe(before);
});

it('is not there for another team, not open to a viewer, and not for an address that is not confirmed', async () => {
  const sweep = await uploaded(client, projectId, tableOf(7.1));
  const stranger = await makePerson(app, 'Stranger');
  expect((await upload(stranger.client, projectId, tableOf(7.2))).status).toBe(404);
  expect((await stranger.client.get(`/api/sources/${sweep.source.id}/content`)).status).toBe(404);
  expect((await stranger.client.get(`/api/revisions/${sweep.revision.id}/points`)).status).toBe(404);
  const asked = { sha256: [sweep.source.sha256] };
  expect((await stranger.client.post(`/api/projects/${projectId}/sources/known`, asked)).status).toBe(404);

  const viewer = await makePerson(app, 'Viewer');
  await join(app, viewer, mara.teamId, 'viewer');
  expect((await upload<Problem>(viewer.client, projectId, tableOf(7.3))).body.code).toBe('access-denied');
  expect((await viewer.client.get(`/api/revisions/${sweep.revision.id}/points`)).status).toBe(200);

  const newcomer = await makePerson(app, 'Newcomer');
  await join(app, newcomer, mara.teamId, 'member');
  await app.dataSource.query('UPDATE person SET verified_at = NULL WHERE id = $1', [newcomer.me.id]);
  const early = await upload<Problem>(newcomer.client, projectId, tableOf(7.4));
  expect([early.status, early.body.code]).toEqual([403, 'not-verified']);
});

it('stores a file of several rows of 1 MB and hands out the same bytes', async () => {
  const rows = Array.from(
    { length: 60_000 },
    (_, i) => `${(10 + i * 0.3).toFixed(4)},${(8 + (i % 7) / 1000).toFixed(6)},0.5\n`,
  );
  const content = `f,re,im\n${rows.join('')}${'# the rest is remarks\n'.repeat(60_000)}`;
  expect(Buffer.byteLength(content)).toBeGreaterThan(2.5 * 2 ** 20);
  const sweep = await uploaded(client, projectId, content);
  expect(sweep.revision.points).toBeLessThanOrEqual(20_000);
  expect(sweep.revision.findings.map(({ code }) => code)).toContain('thinned');
  const [chunks] = await app.dataSource.query('SELECT count(*)::int AS n FROM source_chunk WHERE source_file_id = $1', [
    sweep.source.id,
  ]);
  expect(chunks.n).toBe(Math.ceil(Buffer.byteLength(content) / 2 ** 20));
  const file = await client.get(`/api/sources/${sweep.source.id}/content`);
  expect(sha256(file.bytes)).toBe(sha256(content));
});

it('counts uploads, so that one person cannot fill the store', async () => {
  const busy = await startApp({ allowances: { 'upload-person': { points: 2, duration: 60 } } });
  const person = await makePerson(busy, 'Busy');
  const project = await makeProject(person);
  const statuses: number[] = [];
  for (const ohm of [8.1, 8.2, 8.3]) statuses.push((await upload(person.client, project, tableOf(ohm))).status);
  expect(statuses).toEqual([201, 201, 429]);
});

it('keeps a file that an upload takes up while the bin is being emptied, and removes one that nobody names', async () => {
  const sweep = await uploaded(client, projectId, tableOf(9.5));
  const { manager } = app.dataSource;
  await manager.query('DELETE FROM sweep WHERE id = $1', [sweep.id]);
  const files = new PostgresFileStore(app.dataSource);
  const tomorrow = new Date(Date.now() + 86_400_000);
  const isThere = () => manager.existsBy(SourceFileEntity, { id: sweep.source.id });
  await app.dataSource.transaction(async (uploading) => {
    await uploading.query('UPDATE source_file SET project_id = project_id WHERE id = $1', [sweep.source.id]);
    await purgeSourceFiles(app.dataSource, files, tomorrow);
  });
  expect(await isThere()).toBe(true);
  await purgeSourceFiles(app.dataSource, files, new Date(0)); // made later than that
  expect(await isThere()).toBe(true);
  await purgeSourceFiles(app.dataSource, files, tomorrow);
  expect(await isThere()).toBe(false);
  expect(await uploaded(client, projectId, tableOf(9.5))).toMatchObject({ revision: { number: 1 } });
});
