import { expect, it } from 'vitest';
import type { Session } from '../../shared/contracts/account.js';
import type { Problem } from '../../shared/contracts/problem.js';
import { startApp } from './support/app.js';
import type { Client } from './support/client.js';
import { makePerson, PASSWORD } from './support/people.js';

const app = await startApp();
const refresh = (client: Client) => client.post<Problem>('/api/account/refresh');
const refreshTokenOf = (client: Client) => {
  return [...client.cookies].find(([name]) => name.startsWith('hummock-refresh'))![1].value;
};
/** Another browser that holds a copy of the cookies. */
function copyOf(client: Client): Client {
  const copy = app.client();
  for (const [name, cookie] of client.cookies) copy.cookies.set(name, cookie);
  return copy;
}

it('ends the access token after a quarter of an hour and refreshes it without a password', async () => {
  const { client } = await makePerson(app, 'Access');
  app.advance(15 * 60_000 + 1000);
  const ended = await client.get<Problem>('/api/me');
  expect([ended.status, ended.body.code]).toEqual([401, 'session-ended']);
  expect((await refresh(client)).status).toBe(204);
  expect((await client.get('/api/me')).status).toBe(200);
});

it('gives two tabs that refresh at the same moment the same successor', async () => {
  const { client } = await makePerson(app, 'Tabs');
  const tab = copyOf(client);
  const answers = await Promise.all([refresh(client), refresh(tab)]);
  expect(answers.map(({ status }) => status)).toEqual([204, 204]);
  expect(refreshTokenOf(tab)).toBe(refreshTokenOf(client));
});

it('ends the whole session when a used token comes back after ten seconds', async () => {
  const { client } = await makePerson(app, 'Thief');
  const thief = copyOf(client);
  await refresh(client);
  app.advance(10_001);
  expect((await refresh(thief)).status).toBe(401);
  expect((await refresh(client)).status).toBe(401);
  expect((await client.get('/api/me')).status).toBe(401);
});

it('ends the whole session when a token older than the predecessor comes back, however soon', async () => {
  const { client } = await makePerson(app, 'Older');
  const older = copyOf(client);
  await refresh(client);
  await refresh(client);
  expect((await refresh(older)).status).toBe(401);
  expect((await refresh(client)).status).toBe(401);
});

it('accepts no refresh token that it did not make', async () => {
  const { client } = await makePerson(app, 'Forged');
  const [id, , proof] = refreshTokenOf(client).split('.');
  const name = [...client.cookies.keys()].find((key) => key.startsWith('hummock-refresh'))!;
  for (const value of [`${id}.2.${proof}`, `${id}.1.${'A'.repeat(43)}`, `${id}.1.`, 'nonsense', `${id}.-1.${proof}`]) {
    const forger = copyOf(client);
    forger.cookies.set(name, { value, path: '/api/account', attributes: '' });
    expect((await refresh(forger)).status).toBe(401);
  }
  expect((await refresh(client)).status).toBe(204); // a forged one does not end the session either
});

it('accepts no access token that is changed, unsigned, or signed for something else', async () => {
  const { client } = await makePerson(app, 'Jwt');
  const [name, cookie] = [...client.cookies].find(([key]) => key.startsWith('hummock-access'))!;
  const [, payload, signature] = cookie.value.split('.');
  const none = Buffer.from(JSON.stringify({ alg: 'none' })).toString('base64url');
  for (const value of [
    `${none}.${payload}.`,
    `${cookie.value.slice(0, -3)}AAA`,
    `${none}.${payload}.${signature}`,
    'x',
  ]) {
    const forger = app.client();
    forger.cookies.set(name, { ...cookie, value });
    expect((await forger.get('/api/me')).status).toBe(401);
  }
});

it('ends a session that was not used for thirty days', async () => {
  const { client } = await makePerson(app, 'Idle');
  app.advance(31 * 86_400_000);
  expect((await refresh(client)).status).toBe(401);
});

it('lists the devices of a person, and ends one or all of them at once', async () => {
  const { client, me } = await makePerson(app, 'Devices');
  const others = [app.client(), app.client()];
  for (const other of others) await other.post('/api/account/sign-in', { email: me.email, password: PASSWORD });
  const { body } = await client.get<{ items: Session[] }>('/api/me/sessions');
  expect(body.items).toHaveLength(3);
  expect(body.items.filter(({ isThisOne }) => isThisOne)).toHaveLength(1);

  const one = (await others[0]!.get<{ items: Session[] }>('/api/me/sessions')).body.items.find((s) => s.isThisOne)!;
  expect((await client.delete(`/api/me/sessions/${one.id}`)).status).toBe(204);
  expect((await others[0]!.get('/api/me')).status).toBe(401);
  expect((await others[1]!.get('/api/me')).status).toBe(200);

  expect((await client.post('/api/me/sign-out-everywhere')).status).toBe(204);
  expect((await others[1]!.get('/api/me')).status).toBe(401);
  expect((await refresh(others[1]!)).status).toBe(401);
});

it('does not let one person end the session of another', async () => {
  const mine = await makePerson(app, 'Mine');
  const theirs = await makePerson(app, 'Theirs');
  const { body } = await theirs.client.get<{ items: Session[] }>('/api/me/sessions');
  expect((await mine.client.delete(`/api/me/sessions/${body.items[0]!.id}`)).status).toBe(404);
  expect((await theirs.client.get('/api/me')).status).toBe(200);
});

it('writes every session that begins or ends into the chain of its person', async () => {
  const { client, me } = await makePerson(app, 'Chain');
  await client.post('/api/account/sign-out');
  const rows = await app.dataSource.query('SELECT action FROM activity WHERE chain_id = $1 ORDER BY sequence', [me.id]);
  expect(rows.map((row: { action: string }) => row.action)).toEqual([
    'person:register',
    'person:verify',
    'session:create',
    'session:end',
  ]);
});
