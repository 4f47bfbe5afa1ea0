import { expect, it } from 'vitest';
import {
  type LimitSet,
  LimitSetPageSchema,
  LimitSetSchema,
  LimitVersionPageSchema,
} from '../../shared/contracts/limit-set.js';
import type { Problem } from '../../shared/contracts/problem.js';
import { startApp } from './support/app.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client, teamId } = mara;
const limitSets = `/api/teams/${teamId}/limit-sets`;
const content = {
  figures: [{ figureId: 'fs', low: 45, high: 52, unit: 'Hz' }],
  curves: [{ frequencyHz: [20, 200], lowOhm: [5, 5], highOhm: null }],
};

async function makeLimits(name: string): Promise<LimitSet> {
  const { status, body } = await client.post<LimitSet>(limitSets, { name, content, note: 'first' });
  expect(status).toBe(201);
  return LimitSetSchema.parse(body);
}

it('keeps limits and publishes numbered versions of them', async () => {
  const limits = await makeLimits('Mid-woofer');
  expect(limits).toMatchObject({ version: 1, teamId, newest: { number: 1, content, note: 'first' } });
  const path = `/api/limit-sets/${limits.id}`;
  const narrower = { ...content, figures: [{ figureId: 'fs', low: 46, high: 50, unit: 'Hz' }] };
  const published = await client.post<LimitSet>(`${path}/versions`, { content: narrower });
  expect(published.body).toMatchObject({ version: 2, newest: { number: 2, content: narrower } });
  const { items } = LimitVersionPageSchema.parse((await client.get(`${path}/versions`)).body);
  expect(items.map((version) => [version.number, version.content])).toEqual([
    [1, content],
    [2, narrower],
  ]);
  const listed = LimitSetPageSchema.parse((await client.get(limitSets)).body).items;
  expect(listed).toEqual([published.body]);
});

it('refuses a limit without an end', async () => {
  const open = { figures: [{ figureId: 'fs', low: null, high: null, unit: 'Hz' }] };
  const { status, body } = await client.post<Problem>(limitSets, { name: 'Open', content: open });
  expect([status, body.issues?.[0]?.path]).toEqual([400, 'content.figures.0']);
});

it('keeps a name for one living set, goes into the bin and comes back', async () => {
  const limits = await makeLimits('Named');
  const path = `/api/limit-sets/${limits.id}`;
  expect((await client.post<Problem>(limitSets, { name: 'Named', content })).body.code).toBe('name-taken');
  expect((await client.patch(path, { name: 'Renamed' }, 1)).body).toMatchObject({ name: 'Renamed', version: 2 });
  expect((await client.patch<Problem>(path, { name: 'Late' }, 1)).body.code).toBe('version-conflict');
  expect((await client.delete(path, 2)).status).toBe(204);
  expect((await client.get(path)).status).toBe(404);
  expect((await client.post(`${path}/versions`, { content })).status).toBe(404);
  expect((await client.post(`${path}/restore`)).body).toMatchObject({ version: 4, deletedAt: null });
});

it('is read by the whole team, changed by leads and owners only, and not there for another team', async () => {
  const limits = await makeLimits('Roles');
  const path = `/api/limit-sets/${limits.id}`;
  const member = await makePerson(app, 'Member');
  await join(app, member, teamId, 'member');
  expect((await member.client.get(path)).status).toBe(200);
  const tries = (who: typeof member.client) => [
    who.post(limitSets, { name: 'x', content }),
    who.patch(path, { name: 'x' }, 1),
    who.post(`${path}/versions`, { content }),
    who.delete(path),
    who.post(`${path}/restore`),
  ];
  expect((await Promise.all(tries(member.client))).map(({ status }) => status)).toEqual(Array(5).fill(403));
  const stranger = await makePerson(app, 'Stranger');
  const outside = [...tries(stranger.client), stranger.client.get(path), stranger.client.get(limitSets)];
  expect((await Promise.all(outside)).map(({ status }) => status)).toEqual(Array(7).fill(404));
});
