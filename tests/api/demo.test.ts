import { expect, it } from 'vitest';
import { readConfig } from '../../server/config.js';
import { DEMO_PEOPLE } from '../../server/demo/people.js';
import { seedDemo } from '../../server/demo/seed.js';
import type { Me } from '../../shared/contracts/account.js';
import { ProjectSchema } from '../../shared/contracts/project.js';
import { SheetPageSchema } from '../../shared/contracts/sheet.js';
import { SweepPageSchema } from '../../shared/contracts/sweep.js';
import { startApp } from './support/app.js';
import { upload } from './support/measured.js';
import { makePerson } from './support/people.js';

const app = await startApp();
const began = performance.now();
const signIn = await seedDemo(app.dataSource);
const seededMs = performance.now() - began;
const client = app.client();
const signedIn = await client.post<Me>('/api/account/sign-in', signIn);
const { body: me } = await client.get<Me>('/api/me');
const projectId = me.demoProjectId!;
const rows = async (table: string) => (await app.dataSource.query(`SELECT count(*)::int AS n FROM ${table}`))[0].n;

it('lets every person of the demo sign in with the printed password, in their role', async () => {
  expect(signedIn.status).toBe(200);
  for (const { email, role } of DEMO_PEOPLE) {
    const own = app.client();
    expect((await own.post('/api/account/sign-in', { email, password: signIn.password })).status).toBe(200);
    expect((await own.get<Me>('/api/me')).body).toMatchObject({ verified: true, teams: [{ role }] });
  }
});

it('fills the project with sweeps that were read from files without a complaint', async () => {
  const project = ProjectSchema.parse((await client.get(`/api/projects/${projectId}`)).body);
  expect(project).toMatchObject({ isInvented: true, counts: { sweeps: 44, sheets: 6, items: 37 } });
  const { items } = SweepPageSchema.parse((await client.get(`/api/projects/${projectId}/sweeps?limit=100`)).body);
  const groups = new Map<string, number>();
  for (const { group } of items) groups.set(group, (groups.get(group) ?? 0) + 1);
  expect(Object.fromEntries(groups)).toEqual({
    'Lot of sixteen': 16,
    'Added mass': 3,
    'Known volume': 1,
    Cabinets: 8,
    'Radiator box': 4,
    'Crossover drawer': 12,
  });
  expect(items.every(({ revision }) => revision.hasPhase)).toBe(true);
  expect(items.flatMap(({ revision }) => revision.findings)).toEqual([]);
  const source = await client.get(`/api/sources/${items[0]!.source.id}/content`);
  expect(Buffer.from(source.bytes).toString()).toContain('Hillside School');
});

it('draws only sweeps that are there, and fits with the mass that was told', async () => {
  const { items: sheets } = SheetPageSchema.parse((await client.get(`/api/projects/${projectId}/sheets`)).body);
  for (const { sweepId } of sheets.flatMap(({ content }) => content.drawn))
    expect((await client.get(`/api/sweeps/${sweepId}`)).status).toBe(200);
  const [card] = sheets.flatMap(({ content }) => content.cards);
  expect(card).toMatchObject({ calculatorId: 'driver-fit', inputs: { 'added-mass': [{ keys: { mass: 0.0102 } }] } });
});

it('takes a few seconds', () => {
  expect(seededMs).toBeLessThan(30_000); // the test machine shares its cores; alone it takes about 3 s
});

it('is seeded once: a second start changes nothing, also after something was deleted', async () => {
  const tables = ['person', 'team', 'project', 'item', 'sweep', 'sheet', 'activity'];
  const { items } = SweepPageSchema.parse((await client.get(`/api/projects/${projectId}/sweeps?limit=1`)).body);
  await app.dataSource.query('DELETE FROM sweep WHERE id = $1', [items[0]!.id]);
  const before = await Promise.all(tables.map(rows));
  await Promise.all([seedDemo(app.dataSource), seedDemo(app.dataSource)]);
  expect(await Promise.all(tables.map(rows))).toEqual(before);
});

it('goes on where an interrupted seed stopped', async () => {
  const other = await startApp();
  await seedDemo(other.dataSource);
  await other.dataSource.query("DELETE FROM activity WHERE action = 'demo:seed'");
  await other.dataSource.query("DELETE FROM sheet WHERE name LIKE 'Cabinets%'");
  await other.dataSource.query("DELETE FROM sweep WHERE name = 'MW-16 free air'");
  await seedDemo(other.dataSource);
  const counted = await other.dataSource.query(
    'SELECT (SELECT count(*)::int FROM sweep) AS sweeps, (SELECT count(*)::int FROM sheet) AS sheets',
  );
  expect(counted[0]).toEqual({ sweeps: 44, sheets: 6 });
});

it('is open to look at for anybody signed in, and to change for nobody but its people', async () => {
  const visitor = await makePerson(app, 'Visitor');
  expect(visitor.me.demoProjectId).toBe(projectId);
  const { body } = await visitor.client.get(`/api/projects/${projectId}/sweeps?limit=1`);
  const [sweep] = SweepPageSchema.parse(body).items;
  expect((await visitor.client.get(`/api/revisions/${sweep!.revision.id}/points`)).status).toBe(200);
  expect((await visitor.client.delete(`/api/sweeps/${sweep!.id}`)).status).toBe(403);
  expect((await upload(visitor.client, projectId, 'f,z\n1,2\n')).status).toBe(403);
});

it.each([
  [{}, true],
  [{ HUMMOCK_HOST: '::1' }, true],
  [{ HUMMOCK_HOST: '0.0.0.0' }, false],
  [{ HUMMOCK_PUBLIC_URL: 'https://hummock.example' }, false],
  [{ HUMMOCK_PUBLIC_URL: 'https://hummock.example', HUMMOCK_DEMO: 'yes' }, true],
  [{ HUMMOCK_DEMO: 'no' }, false],
])('with %j the demo, whose password is printed, is there: %s', (environment, hasDemo) => {
  const needed = { DATABASE_URL: 'postgres://localhost/none', HUMMOCK_SECRET: 'x'.repeat(40) };
  expect(readConfig({ ...needed, ...environment }).hasDemo).toBe(hasDemo);
});
