import { expect, it } from 'vitest';
import { calculatorById } from '../../calculators/index.js';
import type { Problem } from '../../shared/contracts/problem.js';
import { type Setup, SetupPageSchema, SetupSchema, SetupVersionPageSchema } from '../../shared/contracts/setup.js';
import { startApp } from './support/app.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client, teamId } = mara;
const setups = `/api/teams/${teamId}/setups`;

async function makeSetup(name: string, settings: Record<string, unknown> = {}): Promise<Setup> {
  const { status, body } = await client.post<Setup>(setups, { name, calculatorId: 'driver-fit', settings });
  expect(status).toBe(201);
  return SetupSchema.parse(body);
}

it('keeps a setup with every setting written out, so that a version never drifts with a default', async () => {
  const setup = await makeSetup('House fit', { robust: false });
  const { version, settingsVersion } = calculatorById('driver-fit')!;
  expect(setup).toMatchObject({ name: 'House fit', calculatorId: 'driver-fit', version: 1 });
  expect(setup.newest).toMatchObject({ number: 1, calculatorVersion: version, settingsVersion, note: '' });
  expect(setup.newest.settings).toMatchObject({ robust: false, coil: 'auto', suspension: 'auto' });
  expect(setup.newest.createdBy).toEqual({ id: mara.me.id, name: 'Mara' });
  const listed = SetupPageSchema.parse((await client.get(setups)).body).items;
  expect(listed).toContainEqual(setup);
});

it('publishes numbered versions and leaves the earlier ones as they were', async () => {
  const setup = await makeSetup('Numbered');
  const path = `/api/setups/${setup.id}`;
  const published = await client.post<Setup>(`${path}/versions`, { settings: { coil: 'power-law' }, note: 'simpler' });
  expect(published.status).toBe(201);
  expect(published.body).toMatchObject({ version: 2, newest: { number: 2, note: 'simpler' } });
  const { items } = SetupVersionPageSchema.parse((await client.get(`${path}/versions`)).body);
  expect(items.map(({ number, settings }) => [number, settings.coil])).toEqual([
    [1, 'auto'],
    [2, 'power-law'],
  ]);
  expect(items[0]).toEqual(setup.newest);
});

it('gives two people who publish at once two numbers', async () => {
  const setup = await makeSetup('Race');
  const path = `/api/setups/${setup.id}/versions`;
  const answers = await Promise.all(Array.from({ length: 4 }, () => client.post<Setup>(path, { settings: {} })));
  expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
  expect(answers.map(({ body }) => body.newest.number).sort()).toEqual([2, 3, 4, 5]);
  const late = await client.send<Problem>('POST', path, { settings: {} }, { 'if-match': '"1"' });
  expect(late.body.code).toBe('version-conflict');
});

it('has no way to change or remove a version', async () => {
  const setup = await makeSetup('Fixed');
  const path = `/api/setups/${setup.id}/versions/${setup.newest.id}`;
  expect((await client.patch(path, { note: 'x' }, 1)).status).toBe(404);
  expect((await client.delete(path)).status).toBe(404);
});

it('refuses settings that the calculator does not take, and a calculator that is not here', async () => {
  const odd = { name: 'Odd', calculatorId: 'driver-fit', settings: { coil: 'gold' } };
  const refused = await client.post<Problem>(setups, odd);
  expect(refused.body).toMatchObject({ code: 'validation-failed', issues: [{ path: 'settings.coil' }] });
  const unknown = await client.post<Problem>(setups, { ...odd, calculatorId: 'horoscope' });
  expect(unknown.body).toMatchObject({ code: 'validation-failed', issues: [{ path: 'calculatorId' }] });
});

it('keeps a name for one living setup of the team', async () => {
  const setup = await makeSetup('Taken');
  const again = { name: 'Taken', calculatorId: 'driver-fit', settings: {} };
  expect((await client.post<Problem>(setups, again)).body.code).toBe('name-taken');
  const other = await makeSetup('Free');
  expect((await client.patch<Problem>(`/api/setups/${other.id}`, { name: 'Taken' }, 1)).body.code).toBe('name-taken');
  await client.delete(`/api/setups/${setup.id}`, 1);
  expect((await client.post(setups, again)).status).toBe(201);
  expect((await client.post<Problem>(`/api/setups/${setup.id}/restore`)).body.code).toBe('name-taken');
  expect((await client.patch(`/api/setups/${other.id}`, { name: 'Renamed' }, 1)).body).toMatchObject({ version: 2 });
});

it('is read by the whole team and changed by leads and owners only', async () => {
  const setup = await makeSetup('Roles');
  const path = `/api/setups/${setup.id}`;
  const member = await makePerson(app, 'Member');
  await join(app, member, teamId, 'member');
  expect((await member.client.get(path)).status).toBe(200);
  const body = { name: 'x', calculatorId: 'driver-fit', settings: {} };
  const tries = (who: typeof member.client) => [
    who.post(setups, body),
    who.patch(path, { name: 'x' }, 1),
    who.post(`${path}/versions`, { settings: {} }),
    who.delete(path),
    who.post(`${path}/restore`),
  ];
  expect((await Promise.all(tries(member.client))).map(({ status }) => status)).toEqual(Array(5).fill(403));
  const lead = await makePerson(app, 'Lead');
  await join(app, lead, teamId, 'lead');
  expect((await lead.client.post(`${path}/versions`, { settings: {} })).status).toBe(201);
  const stranger = await makePerson(app, 'Stranger');
  const outside = [...tries(stranger.client), stranger.client.get(path), stranger.client.get(setups)];
  expect((await Promise.all(outside)).map(({ status }) => status)).toEqual(Array(7).fill(404));
});
