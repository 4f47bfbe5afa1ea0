import { randomUUID } from 'node:crypto';
import { expect, it } from 'vitest';
import type { Problem } from '../../shared/contracts/problem.js';
import {
  BatchAnswerSchema,
  SweepPageSchema,
  SweepRevisionPageSchema,
  type SweepRow,
  SweepSchema,
} from '../../shared/contracts/sweep.js';
import { decodePoints } from '../../shared/points.js';
import { startApp } from './support/app.js';
import { makeProject, tableOf, uploaded } from './support/measured.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client } = mara;
const projectId = await makeProject(mara);
let tables = 0;
/** A file that no other test has sent. */
function newTable(): string {
  tables += 1;
  return tableOf(5 + tables / 100);
}

async function activityOf(entityId: string): Promise<{ action: string; from: unknown; to: unknown }[]> {
  return app.dataSource.query('SELECT action, "from", "to" FROM activity WHERE entity_id = $1 ORDER BY sequence', [
    entityId,
  ]);
}

it('lists the sweeps of a project page by page, each once', async () => {
  const project = await makeProject(mara, 'Paging');
  const made: string[] = [];
  for (let i = 0; i < 5; i++) made.push((await uploaded(client, project, newTable())).id);
  const listed: string[] = [];
  for (let cursor: string | null = ''; cursor !== null; ) {
    const query: string = cursor ? `&cursor=${cursor}` : '';
    const page = SweepPageSchema.parse((await client.get(`/api/projects/${project}/sweeps?limit=2${query}`)).body);
    listed.push(...page.items.map(({ id }) => id));
    cursor = page.next;
  }
  expect(listed).toEqual(made);
});

it('changes what a person told of a sweep, and says from what to what in the activity', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const item = await client.post(`/api/projects/${projectId}/items`, { kind: 'driver', name: 'MW-01' });
  const change = {
    name: 'MW-01 with 10 g',
    conditions: { role: 'added-mass', addedMassKg: 0.01 },
    itemId: item.body.id,
    group: 'Added mass',
    tags: ['lot'],
  };
  const { status, body } = await client.patch(`/api/sweeps/${sweep.id}`, change, sweep.version);
  expect(status).toBe(200);
  expect(SweepSchema.parse(body)).toMatchObject({ ...change, version: sweep.version + 1 });
  const changes = await activityOf(sweep.id);
  expect(changes.map(({ action }) => action)).toEqual(['sweep:create', 'sweep:update']);
  expect(changes[1]).toMatchObject({ from: { name: 'A sweep', group: '', itemId: null }, to: change });
  expect((await client.get(`/api/sweeps/${sweep.id}`)).body).toEqual(body);
});

it('makes no version and no activity of an edit that changes nothing', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const same = { name: sweep.name, conditions: sweep.conditions, tags: sweep.tags };
  const { body } = await client.patch(`/api/sweeps/${sweep.id}`, same, sweep.version);
  expect(body.version).toBe(sweep.version);
  expect(await activityOf(sweep.id)).toHaveLength(1);
});

it('refuses an edit of an older version, with the row as it is now, and one that names no version', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const path = `/api/sweeps/${sweep.id}`;
  const now = (await client.patch(path, { name: 'Newer' }, sweep.version)).body;
  const late = await client.patch<Problem>(path, { name: 'Older' }, sweep.version);
  expect(late.status).toBe(409);
  expect(late.body).toMatchObject({ code: 'version-conflict', extra: { current: now, yours: { name: 'Older' } } });
  expect((await client.patch<Problem>(path, { name: 'Blind' })).body.code).toBe('version-missing');
  expect((await client.get(path)).body).toEqual(now);
});

it('lets one of several edits of the same version win', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const edits = ['A', 'B', 'C', 'D'].map((name) => client.patch(`/api/sweeps/${sweep.id}`, { name }, sweep.version));
  const statuses = (await Promise.all(edits)).map(({ status }) => status).sort();
  expect(statuses).toEqual([200, 409, 409, 409]);
});

it('puts a sweep into the bin and takes it out again, whole', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const path = `/api/sweeps/${sweep.id}`;
  expect((await client.delete(path, sweep.version + 7)).status).toBe(409);
  expect((await client.delete(path, sweep.version)).status).toBe(204);
  for (const gone of [path, `${path}/revisions`, `/api/revisions/${sweep.revision.id}/points`])
    expect((await client.get(gone)).status).toBe(404);
  expect((await client.patch(path, { name: 'x' }, sweep.version + 1)).status).toBe(404);
  const restored = await client.post<SweepRow>(`${path}/restore`);
  expect(restored.body).toMatchObject({ deletedAt: null, version: sweep.version + 2, source: sweep.source });
  expect((await activityOf(sweep.id)).map(({ action }) => action)).toEqual([
    'sweep:create',
    'sweep:delete',
    'sweep:restore',
  ]);
});

it('undoes one drop of files whole, leaves the others, and brings it back whole', async () => {
  const project = await makeProject(mara, 'Batches');
  const batchId = randomUUID();
  const dropped: string[] = [];
  for (let i = 0; i < 3; i++) dropped.push((await uploaded(client, project, newTable(), { sweep: { batchId } })).id);
  const other = await uploaded(client, project, newTable());
  const living = async () => {
    const { body } = await client.get(`/api/projects/${project}/sweeps`);
    return SweepPageSchema.parse(body).items.map(({ id }) => id);
  };
  const batch = `/api/projects/${project}/batches/${batchId}`;
  const undone = BatchAnswerSchema.parse((await client.post(`${batch}/undo`)).body);
  expect(undone.sweepIds).toEqual(dropped);
  expect(await living()).toEqual([other.id]);
  expect(BatchAnswerSchema.parse((await client.post(`${batch}/undo`)).body).sweepIds).toEqual([]);
  const restored = BatchAnswerSchema.parse((await client.post(`${batch}/restore`)).body);
  expect(restored.sweepIds).toEqual(dropped);
  expect(await living()).toEqual([...dropped, other.id]);
});

it('leaves in the bin what was added again since, when a batch is brought back', async () => {
  const project = await makeProject(mara, 'Again');
  const batchId = randomUUID();
  const [first, second] = [newTable(), newTable()];
  const one = await uploaded(client, project, first, { sweep: { batchId } });
  const two = await uploaded(client, project, second, { sweep: { batchId } });
  const batch = `/api/projects/${project}/batches/${batchId}`;
  await client.post(`${batch}/undo`);
  await uploaded(client, project, second);
  const restored = BatchAnswerSchema.parse((await client.post(`${batch}/restore`)).body);
  expect(restored.sweepIds).toEqual([one.id]);
  expect((await client.get(`/api/sweeps/${two.id}`)).status).toBe(404);
});

it('survives edits, undo and restore of the same batch at the same time', async () => {
  const project = await makeProject(mara, 'Busy');
  const batchId = randomUUID();
  const sweeps: SweepRow[] = [];
  for (let i = 0; i < 4; i++) sweeps.push(await uploaded(client, project, newTable(), { sweep: { batchId } }));
  const batch = `/api/projects/${project}/batches/${batchId}`;
  const work = sweeps.flatMap(({ id, version }) => [
    client.patch(`/api/sweeps/${id}`, { name: 'Edited' }, version),
    client.post(`${batch}/undo`),
    client.post(`${batch}/restore`),
  ]);
  const statuses = new Set((await Promise.all(work)).map(({ status }) => status));
  expect([...statuses].filter((status) => ![200, 404, 409].includes(status))).toEqual([]);
});

it('reads a stored file again with another rule: a new revision, the older one stays', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const path = `/api/sweeps/${sweep.id}/revisions`;
  const columns = ['frequency', 'magnitude', 'ignore'];
  const again = await client.post<SweepRow>(path, { reading: { columns } });
  expect(again.status).toBe(200);
  expect(again.body.revision).toMatchObject({ number: 2, hasPhase: false, reading: { columns } });
  expect(again.body.version).toBe(sweep.version + 1);
  expect(again.body.revision.pointsSha256).not.toBe(sweep.revision.pointsSha256);

  const { items } = SweepRevisionPageSchema.parse((await client.get(path)).body);
  expect(items.map(({ number, hasPhase }) => [number, hasPhase])).toEqual([
    [1, true],
    [2, false],
  ]);
  const old = await client.get(`/api/revisions/${items[0]!.id}/points`);
  expect(decodePoints(old.bytes, 24, true)).toHaveProperty('imaginaryOhm');
  const fresh = await client.get(`/api/revisions/${items[1]!.id}/points`);
  expect(decodePoints(fresh.bytes, 24, false)).toHaveProperty('magnitudeOhm');
});

it('makes no revision of the same reading', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const again = await client.post<SweepRow>(`/api/sweeps/${sweep.id}/revisions`, { reading: {} });
  expect(again.body).toEqual(sweep);
});

it('refuses a rule under which the file cannot be read, and keeps the sweep as it is', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const path = `/api/sweeps/${sweep.id}`;
  const refused = await client.post<Problem>(`${path}/revisions`, { reading: { columns: ['ignore', 'ignore'] } });
  expect(refused.status).toBe(422);
  expect(refused.body.code).toBe('file-refused');
  expect(refused.body.extra).toHaveProperty('where');
  expect((await client.get(path)).body).toEqual(sweep);
  const odd = await client.post<Problem>(`${path}/revisions`, { reading: { separator: 'pipe' } });
  expect(odd.body).toMatchObject({ code: 'validation-failed', issues: [{ path: 'reading.separator' }] });
  const late = await client.send<Problem>(
    'POST',
    `${path}/revisions`,
    { reading: { decimalMark: 'point' } },
    { 'if-match': `"${sweep.version + 3}"` },
  );
  expect(late.body.code).toBe('version-conflict');
});

it('keeps sweeps of one team out of sight of another and out of reach of a viewer', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const path = `/api/sweeps/${sweep.id}`;
  const stranger = await makePerson(app, 'Stranger');
  const batch = `/api/projects/${projectId}/batches/${sweep.batchId}`;
  const tries = [
    stranger.client.get(`/api/projects/${projectId}/sweeps`),
    stranger.client.get(path),
    stranger.client.patch(path, { name: 'x' }, sweep.version),
    stranger.client.delete(path),
    stranger.client.post(`${path}/restore`),
    stranger.client.get(`${path}/revisions`),
    stranger.client.post(`${path}/revisions`, { reading: {} }),
    stranger.client.post(`${batch}/undo`),
    stranger.client.post(`${batch}/restore`),
  ];
  expect(new Set((await Promise.all(tries)).map(({ status }) => status))).toEqual(new Set([404]));

  const viewer = await makePerson(app, 'Viewer');
  await join(app, viewer, mara.teamId, 'viewer');
  expect((await viewer.client.get(path)).status).toBe(200);
  expect((await viewer.client.patch(path, { name: 'x' }, sweep.version)).status).toBe(403);
  expect((await viewer.client.post(`${batch}/undo`)).status).toBe(403);
});

it('refuses a name with a character that cannot be stored, in words', async () => {
  const sweep = await uploaded(client, projectId, newTable());
  const { status, body } = await client.patch<Problem>(`/api/sweeps/${sweep.id}`, { name: 'a\u0000b' }, sweep.version);
  expect([status, body.code]).toEqual([400, 'validation-failed']);
});
