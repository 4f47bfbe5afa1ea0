import { expect, it } from 'vitest';
import type { Page } from '../../shared/contracts/paging.js';
import type { Problem } from '../../shared/contracts/problem.js';
import type { Project } from '../../shared/contracts/project.js';
import type { BinEntry } from '../../shared/contracts/team.js';
import { startApp } from './support/app.js';
import { makePerson } from './support/people.js';

const app = await startApp();
const owner = await makePerson(app, 'Owner');
const { client, teamId } = owner;
const make = async (name: string) =>
  (await client.post<Project>(`/api/teams/${teamId}/projects`, { name, note: 'Rehearsal room' })).body;

it('makes a project, reads it and lists it with what it holds', async () => {
  const answer = await client.post<Project>(`/api/teams/${teamId}/projects`, { name: ' Monitors ', note: '' });
  expect(answer.status).toBe(201);
  expect(answer.body).toMatchObject({
    name: 'Monitors',
    teamId,
    version: 1,
    deletedAt: null,
    isInvented: false,
    counts: { sweeps: 0, sheets: 0, items: 0, results: 0 },
  });
  await client.post(`/api/projects/${answer.body.id}/items`, { kind: 'driver', name: 'M1' });
  const read = await client.get<Project>(`/api/projects/${answer.body.id}`);
  expect(read.body.counts).toEqual({ sweeps: 0, sheets: 0, items: 1, results: 0 });
  const list = await client.get<Page<Project>>(`/api/teams/${teamId}/projects`);
  expect(list.body.items).toContainEqual(read.body);
});

it('counts nothing that lies in the bin', async () => {
  const project = await make('Counting');
  const item = await client.post<{ id: string }>(`/api/projects/${project.id}/items`, { kind: 'box', name: 'B1' });
  await client.delete(`/api/items/${item.body.id}`);
  expect((await client.get<Project>(`/api/projects/${project.id}`)).body.counts.items).toBe(0);
});

it('changes what is named and keeps the rest', async () => {
  const project = await make('Before');
  const changed = await client.patch<Project>(`/api/projects/${project.id}`, { name: 'After' }, 1);
  expect(changed.body).toMatchObject({ name: 'After', note: 'Rehearsal room', version: 2 });
});

it('refuses an edit of an older version with both versions, and one that names none', async () => {
  const project = await make('Contested');
  const path = `/api/projects/${project.id}`;
  await client.patch(path, { name: 'First' }, 1);
  const second = await client.patch<Problem>(path, { name: 'Second' }, 1);
  expect([second.status, second.body.code]).toEqual([409, 'version-conflict']);
  expect(second.body.extra).toMatchObject({ current: { name: 'First', version: 2 }, yours: { name: 'Second' } });
  const blind = await client.patch<Problem>(path, { name: 'Third' });
  expect([blind.status, blind.body.code]).toEqual([428, 'version-missing']);
  const odd = await client.send<Problem>('PATCH', path, { name: 'Third' }, { 'if-match': 'two' });
  expect([odd.status, odd.body.code]).toEqual([428, 'version-missing']);
});

it('lets exactly one of ten edits of the same version win', async () => {
  const project = await make('Race');
  const names = Array.from({ length: 10 }, (_, i) => `Name ${i}`);
  const answers = await Promise.all(
    names.map((name) => client.patch<Project & Problem>(`/api/projects/${project.id}`, { name }, 1)),
  );
  const won = answers.filter(({ status }) => status === 200);
  expect(won).toHaveLength(1);
  expect(answers.filter(({ status }) => status === 409)).toHaveLength(9);
  const after = await client.get<Project>(`/api/projects/${project.id}`);
  expect(after.body).toMatchObject({ name: won[0]!.body.name, version: 2 });
});

it('puts a project into the bin whole and brings it back', async () => {
  const project = await make('Binned');
  const item = await client.post<{ id: string }>(`/api/projects/${project.id}/items`, { kind: 'part', name: 'C3' });
  expect((await client.delete(`/api/projects/${project.id}`, 1)).status).toBe(204);
  expect((await client.get(`/api/projects/${project.id}`)).status).toBe(404);
  expect((await client.get(`/api/items/${item.body.id}`)).status).toBe(404);
  expect((await client.post(`/api/projects/${project.id}/items`, { kind: 'part', name: 'C4' })).status).toBe(404);

  const bin = await client.get<Page<BinEntry>>(`/api/teams/${teamId}/bin`);
  const entry = bin.body.items.find(({ entityId }) => entityId === project.id)!;
  expect(entry).toMatchObject({ entity: 'project', name: 'Binned', project: null, deletedBy: { name: 'Owner' } });
  expect(Date.parse(entry.purgedAt) - Date.parse(entry.deletedAt)).toBe(90 * 86_400_000);

  const restored = await client.post<Project>(`/api/projects/${project.id}/restore`);
  expect(restored.body).toMatchObject({ id: project.id, deletedAt: null, version: 3, counts: { items: 1 } });
  expect((await client.get(`/api/items/${item.body.id}`)).status).toBe(200);
  const again = await client.post<Project>(`/api/projects/${project.id}/restore`);
  expect(again.body.version).toBe(3); // restoring what is not in the bin changes nothing
});

it('refuses to delete a version that is no longer there', async () => {
  const project = await make('Moved on');
  await client.patch(`/api/projects/${project.id}`, { note: 'newer' }, 1);
  expect((await client.delete(`/api/projects/${project.id}`, 1)).status).toBe(409);
});

it('pages by cursor, newest first, without repeating or losing one', async () => {
  const other = await makePerson(app, 'Pages');
  const made: string[] = [];
  for (let i = 0; i < 7; i += 1) {
    const { body } = await other.client.post<Project>(`/api/teams/${other.teamId}/projects`, { name: `P${i}` });
    made.unshift(body.id);
  }
  const seen: string[] = [];
  let cursor: string | null = '';
  while (cursor !== null) {
    const query: string = cursor === '' ? '' : `&cursor=${encodeURIComponent(cursor)}`;
    const page = await other.client.get<Page<Project>>(`/api/teams/${other.teamId}/projects?limit=3${query}`);
    expect(page.body.items.length).toBeLessThanOrEqual(3);
    seen.push(...page.body.items.map(({ id }) => id));
    if (seen.length === 3) await other.client.post(`/api/teams/${other.teamId}/projects`, { name: 'Meanwhile' });
    cursor = page.body.next;
  }
  expect(seen).toEqual(made);
});

it('refuses a cursor that it did not give and a page larger than it serves', async () => {
  const path = `/api/teams/${teamId}/projects`;
  expect((await client.get(`${path}?cursor=nonsense`)).status).toBe(400);
  expect((await client.get(`${path}?limit=0`)).status).toBe(400);
  expect((await client.get(`${path}?limit=501`)).status).toBe(400);
});

it.each([
  ['no name', { note: '' }],
  ['an empty name', { name: '  ' }],
  ['a name that is too long', { name: 'x'.repeat(81) }],
  ['a field that is not known', { name: 'x', isInvented: true }],
  ['a name of another kind', { name: 12 }],
  ['a character that cannot be stored', { name: 'a\u0000b' }],
  ['no object', [1, 2]],
])('refuses a project with %s and stores nothing', async (_, body) => {
  const count = 'SELECT count(*)::int AS n FROM project';
  const before = await app.dataSource.query(count);
  const answer = await client.post<Problem>(`/api/teams/${teamId}/projects`, body);
  expect([answer.status, answer.body.code]).toEqual([400, 'validation-failed']);
  expect(await app.dataSource.query(count)).toEqual(before);
});

it('opens the invented project to look at to everyone signed in, confirmed or not, and to nobody else', async () => {
  const project = await make('Invented');
  await client.post(`/api/projects/${project.id}/items`, { kind: 'driver', name: 'W1' });
  await app.dataSource.query('UPDATE project SET is_invented = true WHERE id = $1', [project.id]);
  const visitor = app.client();
  await visitor.post('/api/account/register', { email: 'v@example.test', name: 'V', password: 'a quiet passphrase' });
  await visitor.post('/api/account/sign-in', { email: 'v@example.test', password: 'a quiet passphrase' });
  const me = await visitor.get<{ verified: boolean; demoProjectId: string }>('/api/me');
  expect(me.body).toMatchObject({ verified: false, demoProjectId: project.id });
  expect((await visitor.get(`/api/projects/${project.id}`)).status).toBe(200);
  expect((await visitor.get<Page<unknown>>(`/api/projects/${project.id}/items`)).body.items).toHaveLength(1);
  expect((await visitor.post(`/api/projects/${project.id}/items`, { kind: 'driver', name: 'W2' })).status).toBe(403);
  expect((await visitor.get(`/api/teams/${teamId}/projects`)).status).toBe(404);
  expect((await app.client().get(`/api/projects/${project.id}`)).status).toBe(401);
});

it('lets an unconfirmed person look at their team, and change nothing in it', async () => {
  const newcomer = app.client();
  await newcomer.post('/api/account/register', { email: 'u@example.test', name: 'U', password: 'a quiet passphrase' });
  await newcomer.post('/api/account/sign-in', { email: 'u@example.test', password: 'a quiet passphrase' });
  const { body } = await newcomer.get<{ teams: { id: string }[] }>('/api/me');
  const path = `/api/teams/${body.teams[0]!.id}/projects`;
  expect((await newcomer.get(path)).status).toBe(200);
  const refused = await newcomer.post<Problem>(path, { name: 'Too early' });
  expect([refused.status, refused.body.code]).toEqual([403, 'not-verified']);
});
