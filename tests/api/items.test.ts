import { expect, it } from 'vitest';
import type { Item } from '../../shared/contracts/item.js';
import type { Page } from '../../shared/contracts/paging.js';
import type { Problem } from '../../shared/contracts/problem.js';
import type { Project } from '../../shared/contracts/project.js';
import { startApp } from './support/app.js';
import { makePerson } from './support/people.js';

const app = await startApp();
const { client, teamId } = await makePerson(app, 'Keeper');
const project = (await client.post<Project>(`/api/teams/${teamId}/projects`, { name: 'Drawer' })).body;
const path = `/api/projects/${project.id}/items`;
const published = { fs: { value: 38, unit: 'Hz', tolerance: 0.1 }, Vas: { value: 0.031, unit: 'm³' } };

it('keeps an item with its published figures', async () => {
  const made = await client.post<Item>(path, { kind: 'driver', name: 'Mid-woofer 3', serial: 'MW-3', published });
  expect(made.status).toBe(201);
  expect(made.body).toMatchObject({
    kind: 'driver',
    serial: 'MW-3',
    note: '',
    published,
    version: 1,
    projectId: project.id,
  });
  expect((await client.get<Item>(`/api/items/${made.body.id}`)).body).toEqual(made.body);
});

it('lists by kind, in the order of making', async () => {
  const names = ['C1', 'C2', 'L1'];
  for (const name of names) await client.post(path, { kind: 'part', name });
  const list = await client.get<Page<Item>>(`${path}?kind=part`);
  expect(list.body.items.map(({ name }) => name)).toEqual(names);
  expect((await client.get<Problem>(`${path}?kind=spoon`)).status).toBe(400);
});

it('changes one field and keeps the others; the kind stays', async () => {
  const { body } = await client.post<Item>(path, { kind: 'box', name: 'Cabinet 4', published });
  const changed = await client.patch<Item>(`/api/items/${body.id}`, { note: 'leaks at the terminal' }, 1);
  expect(changed.body).toMatchObject({ name: 'Cabinet 4', note: 'leaks at the terminal', published, version: 2 });
  expect((await client.patch(`/api/items/${body.id}`, { kind: 'jig' }, 2)).status).toBe(400);
});

it('refuses the edit of an older version with both versions', async () => {
  const { body } = await client.post<Item>(path, { kind: 'jig', name: 'Jig' });
  await client.patch(`/api/items/${body.id}`, { name: 'Jig A' }, 1);
  const late = await client.patch<Problem>(`/api/items/${body.id}`, { name: 'Jig B' }, 1);
  expect(late.status).toBe(409);
  expect(late.body.extra).toMatchObject({ current: { name: 'Jig A', version: 2 }, yours: { name: 'Jig B' } });
});

it('deletes to the bin and restores whole', async () => {
  const { body } = await client.post<Item>(path, { kind: 'driver', name: 'Gone', published });
  expect((await client.delete(`/api/items/${body.id}`)).status).toBe(204);
  expect((await client.get(`/api/items/${body.id}`)).status).toBe(404);
  expect((await client.delete(`/api/items/${body.id}`)).status).toBe(404);
  const restored = await client.post<Item>(`/api/items/${body.id}/restore`);
  expect(restored.body).toMatchObject({ name: 'Gone', published, deletedAt: null, version: 3 });
});

it('does not restore into a project that lies in the bin itself', async () => {
  const other = (await client.post<Project>(`/api/teams/${teamId}/projects`, { name: 'Other' })).body;
  const { body } = await client.post<Item>(`/api/projects/${other.id}/items`, { kind: 'part', name: 'R1' });
  await client.delete(`/api/items/${body.id}`);
  await client.delete(`/api/projects/${other.id}`);
  expect((await client.post(`/api/items/${body.id}/restore`)).status).toBe(404);
  await client.post(`/api/projects/${other.id}/restore`);
  expect((await client.post(`/api/items/${body.id}/restore`)).status).toBe(200);
});

it.each([
  ['a kind that is not known', { kind: 'spoon', name: 'x' }],
  ['no kind', { name: 'x' }],
  ['a figure without unit', { kind: 'driver', name: 'x', published: { fs: { value: 38 } } }],
  ['a tolerance of zero', { kind: 'driver', name: 'x', published: { fs: { value: 38, unit: 'Hz', tolerance: 0 } } }],
  ['a note that is too long', { kind: 'driver', name: 'x', note: 'x'.repeat(2001) }],
])('refuses an item with %s', async (_, body) => {
  const answer = await client.post<Problem>(path, body);
  expect([answer.status, answer.body.code]).toEqual([400, 'validation-failed']);
  expect(answer.body.issues).not.toHaveLength(0);
});
