import pg from 'pg';
import { pino } from 'pino';
import type { QueryDeepPartialEntity } from 'typeorm';
import { expect, it } from 'vitest';
import { activityHash, verifyChain } from '../../server/activity/chain.js';
import {
  type AnnouncedEvent,
  PROJECT_EVENT_CHANNEL,
  projectEventsSince,
} from '../../server/activity/project-events.js';
import { recordChange } from '../../server/activity/record-change.js';
import { ActivityEntity } from '../../server/database/entities/activity.entity.js';
import { verifyChains } from '../../server/jobs/verify-chains.js';
import type { Activity } from '../../shared/contracts/activity.js';
import type { Item } from '../../shared/contracts/item.js';
import type { Page } from '../../shared/contracts/paging.js';
import type { Project } from '../../shared/contracts/project.js';
import { startApp } from './support/app.js';
import { makePerson, type TestPerson } from './support/people.js';

const app = await startApp();
const { manager } = app.dataSource;

async function projectOf({ client, teamId }: TestPerson): Promise<Project> {
  return (await client.post<Project>(`/api/teams/${teamId}/projects`, { name: 'Traced', note: '' })).body;
}
/** A team whose chain holds 1 + 1 + 5 rows: team, project, items. */
async function chainOfSeven(): Promise<TestPerson> {
  const person = await makePerson(app, 'Tracer');
  const project = await projectOf(person);
  for (let i = 0; i < 5; i += 1) {
    await person.client.post(`/api/projects/${project.id}/items`, { kind: 'part', name: `P${i}` });
  }
  return person;
}

it('tells who changed what, from what, to what, newest first and in pages', async () => {
  const person = await makePerson(app, 'Teller');
  const project = await projectOf(person);
  const item = (await person.client.post<Item>(`/api/projects/${project.id}/items`, { kind: 'box', name: 'A' })).body;
  await person.client.patch(`/api/items/${item.id}`, { name: 'B', serial: '' }, 1);
  await person.client.delete(`/api/items/${item.id}`);
  await person.client.post(`/api/items/${item.id}/restore`);
  const path = `/api/projects/${project.id}/activity`;
  const { body } = await person.client.get<Page<Activity>>(path);
  expect(body.items.map(({ action }) => action)).toEqual([
    'item:restore',
    'item:delete',
    'item:update',
    'item:create',
    'project:create',
  ]);
  const [, , update, create] = body.items;
  expect(update).toMatchObject({
    actor: { id: person.me.id, name: 'Teller' },
    entity: 'item',
    entityId: item.id,
    projectId: project.id,
    from: { name: 'A' }, // the serial was sent too, but did not change
    to: { name: 'B' },
    previousHash: create!.hash,
  });
  const first = await person.client.get<Page<Activity>>(`${path}?limit=2`);
  const second = await person.client.get<Page<Activity>>(`${path}?limit=3&cursor=${first.body.next}`);
  expect([...first.body.items, ...second.body.items]).toEqual(body.items);
  expect(second.body.next).toBeNull();
});

it('writes no activity for a change that did not happen', async () => {
  const { client, teamId } = await makePerson(app, 'Refused');
  const project = (await client.post<Project>(`/api/teams/${teamId}/projects`, { name: 'One' })).body;
  const rows = () => manager.countBy(ActivityEntity, { chainId: teamId });
  const before = await rows();
  await client.patch(`/api/projects/${project.id}`, { name: 'Two' }, 9);
  await client.post(`/api/projects/${project.id}/items`, { kind: 'driver' });
  expect(await rows()).toBe(before);
});

it('stands whole while nobody touches it', async () => {
  const { teamId } = await chainOfSeven();
  expect(await verifyChain(manager, teamId)).toMatchObject({ intact: true, sequence: 7 });
});

it.each([
  ['what was changed', `UPDATE activity SET "to" = jsonb_set("to", '{name}', '"forged"') WHERE`],
  ['who did it', 'UPDATE activity SET actor_id = gen_random_uuid() WHERE'],
  ['when', `UPDATE activity SET at = at - interval '1 day' WHERE`],
  ['its own hash', `UPDATE activity SET hash = repeat('a', 64) WHERE`],
  ['the hash before', `UPDATE activity SET previous_hash = repeat('b', 64) WHERE`],
])('shows a row that was altered in %s', async (_, statement) => {
  const { teamId } = await chainOfSeven();
  await manager.query(`${statement} chain_id = $1 AND sequence = 4`, [teamId]);
  expect(await verifyChain(manager, teamId)).toEqual({ intact: false, sequence: 4, reason: 'altered' });
});

it('shows a row that was taken out of the middle', async () => {
  const { teamId } = await chainOfSeven();
  await manager.query('DELETE FROM activity WHERE chain_id = $1 AND sequence = 4', [teamId]);
  expect(await verifyChain(manager, teamId)).toEqual({ intact: false, sequence: 4, reason: 'missing' });
});

it('shows a tail that was cut, by the head in the database and by one kept outside', async () => {
  const { teamId } = await chainOfSeven();
  const kept = await manager.findOneByOrFail(ActivityEntity, { chainId: teamId, sequence: 7 });
  await manager.query('DELETE FROM activity WHERE chain_id = $1 AND sequence > 5', [teamId]);
  expect(await verifyChain(manager, teamId)).toEqual({ intact: false, sequence: 6, reason: 'tail-cut' });
  const five = await manager.findOneByOrFail(ActivityEntity, { chainId: teamId, sequence: 5 });
  await manager.query('UPDATE activity_head SET sequence = 5, hash = $2 WHERE chain_id = $1', [teamId, five.hash]);
  expect(await verifyChain(manager, teamId)).toMatchObject({ intact: true, sequence: 5 }); // whoever may write all may forge the head
  const outside = { sequence: kept.sequence, hash: kept.hash };
  expect(await verifyChain(manager, teamId, outside)).toEqual({ intact: false, sequence: 6, reason: 'tail-cut' });
});

it('shows rows that were forged after the head, with hashes that fit', async () => {
  const { teamId } = await chainOfSeven();
  const last = await manager.findOneByOrFail(ActivityEntity, { chainId: teamId, sequence: 7 });
  const forged = manager.create(ActivityEntity, { ...last, sequence: 8, previousHash: last.hash });
  forged.hash = activityHash(forged);
  await manager.insert(ActivityEntity, forged as QueryDeepPartialEntity<ActivityEntity>);
  const verdict = { intact: false, sequence: 8, reason: 'past-head' };
  expect(await verifyChain(manager, teamId)).toEqual(verdict);
  expect(await verifyChain(manager, teamId, { sequence: 7, hash: last.hash })).toEqual(verdict);
});

it('shows a chain whose rows and head are both gone while its team is there', async () => {
  const { teamId } = await chainOfSeven();
  await manager.query('DELETE FROM activity WHERE chain_id = $1', [teamId]);
  expect(await verifyChain(manager, teamId)).toEqual({ intact: false, sequence: 1, reason: 'tail-cut' });
  await manager.query('DELETE FROM activity_head WHERE chain_id = $1', [teamId]);
  expect(await verifyChain(manager, teamId)).toEqual({ intact: false, sequence: 1, reason: 'tail-cut' });
});

it('verifies every chain by the nightly job and logs those that do not hold, once each', async () => {
  const other = await startApp();
  const lines: Record<string, unknown>[] = [];
  const logger = pino({ level: 'info' }, { write: (line: string) => void lines.push(JSON.parse(line)) });
  const people = [
    await makePerson(other, 'Whole'),
    await makePerson(other, 'Altered'),
    await makePerson(other, 'Gone'),
  ];
  expect(await verifyChains(other.dataSource, logger)).toBe(0);
  expect(lines.splice(0)).toEqual([expect.objectContaining({ event: 'chains-verified', chains: 6, faults: 0 })]);
  const [, altered, gone] = people.map(({ teamId }) => teamId);
  await other.dataSource.query('UPDATE activity SET actor_id = NULL WHERE chain_id = $1', [altered]);
  await other.dataSource.query('DELETE FROM activity WHERE chain_id = $1', [gone]);
  await other.dataSource.query('DELETE FROM activity_head WHERE chain_id = $1', [gone]);
  expect(await verifyChains(other.dataSource, logger)).toBe(2);
  const faults = lines.filter(({ event }) => event === 'chain-fault');
  expect(faults.map(({ chainId, reason }) => [chainId, reason]).sort()).toEqual(
    [
      [altered, 'altered'],
      [gone, 'tail-cut'],
    ].sort(),
  );
});

it('keeps one unbroken chain when forty changes of a team come at once', async () => {
  const { client, teamId } = await makePerson(app, 'Crowd');
  const project = (await client.post<Project>(`/api/teams/${teamId}/projects`, { name: 'Crowd' })).body;
  const names = Array.from({ length: 40 }, (_, i) => `D${i}`);
  const answers = await Promise.all(
    names.map((name) => client.post(`/api/projects/${project.id}/items`, { kind: 'driver', name })),
  );
  expect(answers.every(({ status }) => status === 201)).toBe(true);
  expect(await verifyChain(manager, teamId)).toMatchObject({ intact: true, sequence: 42 });
});

it('undoes the activity with the change when the transaction fails', async () => {
  const { me, teamId } = await makePerson(app, 'Rollback');
  const about = { entity: 'item', entityId: me.id, version: 1, teamId, projectId: null, from: null, to: { name: 'x' } };
  const failing = app.dataSource.transaction(async (inside) => {
    await recordChange(inside, { actor: null, action: 'item:create', ...about });
    throw new Error('after the record');
  });
  await expect(failing).rejects.toThrow('after the record');
  expect(await verifyChain(manager, teamId)).toMatchObject({ intact: true, sequence: 1 });
});

it('keeps every value that JSON can hold through the database, so that its hash still fits', async () => {
  const { me, teamId } = await makePerson(app, 'Values');
  const to = {
    tiny: 5e-324,
    large: 1.7976931348623157e308,
    third: 1 / 3,
    minus: -0,
    text: 'Ω “µ” \\ \n',
    list: [null, {}],
  };
  const about = { entity: 'item', entityId: me.id, version: 1, teamId, projectId: null, from: null, to };
  await app.dataSource.transaction((inside) => recordChange(inside, { actor: null, action: 'item:create', ...about }));
  expect(await verifyChain(manager, teamId)).toMatchObject({ intact: true, sequence: 2 });
});

it('announces a change to listeners when it is committed, with the place to go on from', async () => {
  const person = await makePerson(app, 'Listener');
  const project = await projectOf(person);
  const listener = new pg.Client((app.dataSource.options as { url: string }).url);
  await listener.connect();
  const heard: AnnouncedEvent[] = [];
  listener.on('notification', ({ payload }) => heard.push(JSON.parse(payload ?? '')));
  await listener.query(`LISTEN ${PROJECT_EVENT_CHANNEL}`);
  const item = (await person.client.post<Item>(`/api/projects/${project.id}/items`, { kind: 'jig', name: 'J' })).body;
  await person.client.delete(`/api/items/${item.id}`);
  await expect.poll(() => heard.length).toBe(2);
  await listener.end();
  expect(heard[0]).toEqual({
    teamId: person.teamId,
    projectId: project.id,
    event: { sequence: 3, entity: 'item', entityId: item.id, version: 1, change: 'made', actorId: person.me.id },
  });
  const since = await projectEventsSince(manager, { teamId: person.teamId, projectId: project.id }, 2);
  expect(since).toEqual(heard.map(({ event }) => event));
});
