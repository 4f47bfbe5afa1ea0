import { randomUUID } from 'node:crypto';
import type { Express } from 'express';
import { afterEach, describe, expect, it } from 'vitest';
import { ROLES } from '../../shared/contracts/team.js';
import { type Action, isReading, mayDo, ROUTES, type RouteRule } from '../../shared/permissions.js';
import { startApp } from './support/app.js';
import type { Client } from './support/client.js';
import { join, makePerson, PASSWORD } from './support/people.js';
import { emptyBin, makeWorld } from './support/world.js';

const many = { points: 100_000, duration: 60 };
const app = await startApp({
  allowances: {
    'sign-in-address': many,
    'sign-in-pair': many,
    'sign-in-origin': many,
    'mail-address': many,
    'code-origin': many,
  },
});
const owner = await makePerson(app, 'Owner');
const stranger = await makePerson(app, 'Stranger');
const world: Record<string, string> = await app.dataSource.transaction((manager) =>
  makeWorld(manager, owner.teamId, owner.me.id),
);
const people = {
  owner,
  lead: await makePerson(app, 'Lead'),
  member: await makePerson(app, 'Member'),
  viewer: await makePerson(app, 'Viewer'),
};
for (const role of ['lead', 'member', 'viewer'] as const) await join(app, people[role], owner.teamId, role);

const unconfirmed = app.client();
await unconfirmed.post('/api/account/register', { email: 'not-yet@example.test', name: 'N', password: PASSWORD });
const signedIn = await unconfirmed.post<{ id: string }>('/api/account/sign-in', {
  email: 'not-yet@example.test',
  password: PASSWORD,
});
await app.dataSource.query(`INSERT INTO membership (team_id, person_id, role, version) VALUES ($1, $2, 'owner', 1)`, [
  owner.teamId,
  signedIn.body.id,
]);

interface Layer {
  route?: { path: string; methods?: Record<string, boolean>; stack: { method?: string }[] };
  handle?: { stack?: Layer[] };
}
/** Every route that Express knows under /api, as "METHOD /api/path". */
function registeredRoutes(http: Express): string[] {
  const found: string[] = [];
  const routers = (http.router as unknown as { stack: Layer[] }).stack;
  for (const layer of routers.flatMap(({ handle }) => handle?.stack ?? [])) {
    for (const { method } of layer.route?.stack ?? []) {
      if (method && layer.route?.path !== '/{*any}') found.push(`${method.toUpperCase()} /api${layer.route?.path}`);
    }
  }
  return [...new Set(found)].sort();
}

/** Asks without a body and without a version: whoever is let in meets the next check, which is about the request. */
function ask(client: Client, route: string, ids: Record<string, string>): Promise<number> {
  const [method = '', path = ''] = route.split(' ');
  const asked = path.replace(/:(\w+)/g, (_, name: string) => ids[name] ?? randomUUID());
  return client.status(method, asked);
}
function expectLetIn(status: number): void {
  expect([401, 403, 404, 429]).not.toContain(status);
  expect(status).toBeLessThan(500);
}
const routes = Object.entries(ROUTES) as [string, RouteRule][];
const byRole = routes.filter(([, rule]) => rule.includes(':')) as [string, Action][];
afterEach(() => emptyBin(app.dataSource.manager));

it('names every route that Express has, and none that it has not', () => {
  expect(registeredRoutes(app.app.http)).toEqual(Object.keys(ROUTES).sort());
});

it('finds a route that the table does not name, and the gate does not let it be reached', async () => {
  const { app: other, client } = await startApp();
  other.http.use(
    '/api',
    (await import('express')).Router().get('/secret', (_request, response) => void response.send('reached')),
  );
  expect(registeredRoutes(other.http)).toContain('GET /api/secret');
  expect((await client().get('/api/secret')).status).toBe(404);
});

it('says what the team has agreed: rows pinned by hand, from the roles as they are described to people', () => {
  expect(ROLES.filter((role) => mayDo(role, 'sweep:create'))).toEqual(['owner', 'lead', 'member']);
  expect(ROLES.filter((role) => mayDo(role, 'result:create'))).toEqual(['owner', 'lead', 'member']);
  expect(ROLES.filter((role) => mayDo(role, 'project:create'))).toEqual(['owner', 'lead']);
  expect(ROLES.filter((role) => mayDo(role, 'setup:create'))).toEqual(['owner', 'lead']);
  expect(ROLES.filter((role) => mayDo(role, 'limit-set:update'))).toEqual(['owner', 'lead']);
  expect(ROLES.filter((role) => mayDo(role, 'project:read'))).toEqual(['owner', 'lead', 'member', 'viewer']);
});

describe.each(byRole)('%s', (route, action) => {
  it.each(ROLES)('lets a %s through by the table', async (role) => {
    const status = await ask(people[role].client, route, world);
    if (mayDo(role, action)) expectLetIn(status);
    else expect(status).toBe(403);
  });
  it('answers a stranger as if nothing were there, and nobody at all with 401', async () => {
    expect(await ask(stranger.client, route, world)).toBe(404);
    expect(await ask(app.client(), route, world)).toBe(401);
  });
  it('lets an address that is not confirmed look, not change', async () => {
    const status = await ask(unconfirmed, route, world);
    if (isReading(action)) expectLetIn(status);
    else expect(status).toBe(403);
  });
  it('answers 404 for an id of nothing and for what is no id', async () => {
    expect(await ask(owner.client, route, {})).toBe(404);
    const noIds = Object.fromEntries(Object.keys(world).map((key) => [key, "1'--"]));
    expect(await ask(owner.client, route, noIds)).toBe(404);
  });
});

describe('routes of a person’s own', () => {
  const own = routes.filter(([, rule]) => rule === 'signed-in').map(([route]) => route);
  it.each(own)('%s asks for a session and no more', async (route) => {
    expect(await ask(app.client(), route, {})).toBe(401);
    const client = app.client();
    await client.post('/api/account/sign-in', { email: stranger.me.email, password: PASSWORD });
    const status = await ask(client, route, {});
    if (route.includes(':sessionId'))
      expect(status).toBe(404); // a session of nobody
    else expect([401, 403, 404, 500]).not.toContain(status);
  });
});

describe('open routes', () => {
  const open = routes.filter(([, rule]) => rule === 'open').map(([route]) => route);
  it.each(open)('%s asks for no session', async (route) => {
    const status = await ask(app.client(), route, {});
    if (route.endsWith('/refresh'))
      expect(status).toBe(401); // there is nothing to refresh
    else expect([200, 204, 400]).toContain(status);
  });
});

it('lets a removed member do nothing more from the next request on', async () => {
  const leaving = await makePerson(app, 'Leaving');
  await join(app, leaving, owner.teamId, 'lead');
  const path = `/api/projects/${world.projectId}`;
  expect((await leaving.client.get(path)).status).toBe(200);
  await app.dataSource.query('DELETE FROM membership WHERE person_id = $1 AND team_id = $2', [
    leaving.me.id,
    owner.teamId,
  ]);
  expect((await leaving.client.get(path)).status).toBe(404);
});

it('lets a changed role bite at the next request', async () => {
  const demoted = await makePerson(app, 'Demoted');
  await join(app, demoted, owner.teamId, 'lead');
  const path = `/api/teams/${owner.teamId}/projects`;
  expect((await demoted.client.post(path, { name: 'As lead' })).status).toBe(201);
  await app.dataSource.query(`UPDATE membership SET role = 'viewer' WHERE person_id = $1 AND team_id = $2`, [
    demoted.me.id,
    owner.teamId,
  ]);
  expect((await demoted.client.post(path, { name: 'As viewer' })).status).toBe(403);
});
