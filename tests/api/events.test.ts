import { createServer } from 'node:http';
import { pino } from 'pino';
import { afterEach, expect, it } from 'vitest';
import { type App, createApp } from '../../server/app.js';
import { graphileJobs } from '../../server/jobs/graphile-jobs.js';
import { type ProjectEvent, ProjectEventSchema } from '../../shared/contracts/project-event.js';
import { startApp, TEST_SECRET } from './support/app.js';
import { makeProject, tableOf, uploaded } from './support/measured.js';
import { join, makePerson, type TestPerson } from './support/people.js';

const app = await startApp({ beatMs: 250 });
const mara = await makePerson(app, 'Mara');
const { client } = mara;
const projectId = await makeProject(mara);

interface Stream {
  readonly status: number;
  readonly events: ProjectEvent[];
  readonly ids: number[]; // of every event, the first being where the stream began
  readonly beats: () => number;
  readonly ended: Promise<void>;
  close(): void;
}
/** The test machine may be busy: what should be so soon may take its time. */
const soon = <Value>(value: () => Value) => expect.poll(value, { timeout: 15_000 });

const open: Stream[] = [];
afterEach(() => {
  for (const stream of open.splice(0)) stream.close();
});

/** Follows a project as a browser does. */
async function follow(person: TestPerson, project: string, lastSeen?: number, url = app.url): Promise<Stream> {
  const stop = new AbortController();
  const cookie = [...person.client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const answer = await fetch(`${url}/api/projects/${project}/events`, {
    headers: { cookie, ...(lastSeen !== undefined && { 'last-event-id': String(lastSeen) }) },
    signal: stop.signal,
  });
  const events: ProjectEvent[] = [];
  const ids: number[] = [];
  let beats = 0;
  const take = (block: string) => {
    const line = (name: string) => new RegExp(`^${name}: (.*)$`, 'm').exec(block)?.[1];
    if (block.startsWith(': beat')) beats += 1;
    if (line('id') !== undefined) ids.push(Number(line('id')));
    const data = line('data');
    if (data !== undefined) events.push(ProjectEventSchema.parse(JSON.parse(data)));
  };
  const read = async () => {
    let rest = '';
    for await (const piece of answer.body!.pipeThrough(new TextDecoderStream())) {
      const blocks = (rest + piece).split('\n\n');
      rest = blocks.pop() ?? '';
      blocks.forEach(take);
    }
  };
  const ended = answer.status === 200 ? read().catch(() => {}) : Promise.resolve();
  const stream: Stream = { status: answer.status, events, ids, beats: () => beats, ended, close: () => stop.abort() };
  open.push(stream);
  if (stream.status === 200) await soon(() => ids.length).toBeGreaterThan(0);
  return stream;
}
const changesOf = (stream: Stream) => stream.events.map(({ entity, change, version }) => [entity, change, version]);

it('tells what was made, changed, deleted and restored, by row and version', async () => {
  const stream = await follow(mara, projectId);
  const sweep = await uploaded(client, projectId, tableOf(5.1));
  await client.patch(`/api/sweeps/${sweep.id}`, { name: 'Renamed' }, 1);
  await client.delete(`/api/sweeps/${sweep.id}`);
  await client.post(`/api/sweeps/${sweep.id}/restore`);
  const expected = [
    ['sweep', 'made', 1],
    ['sweep', 'changed', 2],
    ['sweep', 'deleted', 3],
    ['sweep', 'restored', 4],
  ];
  await soon(() => changesOf(stream)).toEqual(expected);
  expect(stream.events.every((event) => event.entityId === sweep.id && event.actorId === mara.me.id)).toBe(true);
});

it('goes on from where a stream was interrupted, each change once', async () => {
  const first = await follow(mara, projectId);
  await client.post(`/api/projects/${projectId}/sheets`, { name: 'Seen' });
  await soon(() => first.events.length).toBe(1);
  first.close();
  for (const name of ['Missed 1', 'Missed 2']) await client.post(`/api/projects/${projectId}/sheets`, { name });
  const second = await follow(mara, projectId, first.ids.at(-1));
  await client.post(`/api/projects/${projectId}/sheets`, { name: 'Live' });
  await soon(() => second.events.length).toBe(3);
  const sequences = second.events.map(({ sequence }) => sequence);
  expect(sequences).toEqual([...new Set(sequences)].sort((a, b) => a - b));
  expect(sequences[0]).toBeGreaterThan(first.ids.at(-1)!);
});

it('tells nothing of another project, and the setups of the team to each of its projects', async () => {
  const other = await makeProject(mara, 'Other');
  const stream = await follow(mara, projectId);
  await client.post(`/api/projects/${other}/sheets`, { name: 'Elsewhere' });
  await client.post(`/api/teams/${mara.teamId}/setups`, { name: 'House', calculatorId: 'driver-fit', settings: {} });
  await soon(() => changesOf(stream)).toEqual([['setup', 'made', 1]]);
});

it('hears what another server of the same database did', async () => {
  const stream = await follow(mara, projectId);
  const second = secondApp();
  const server = createServer(second.http);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as { port: number };
  const cookie = [...client.cookies].map(([name, { value }]) => `${name}=${value}`).join('; ');
  const made = await fetch(`http://127.0.0.1:${port}/api/projects/${projectId}/sheets`, {
    method: 'POST',
    headers: { cookie, origin: app.url, 'content-type': 'application/json' },
    body: JSON.stringify({ name: 'From the other server' }),
  });
  expect(made.status).toBe(201);
  await soon(() => changesOf(stream)).toEqual([['sheet', 'made', 1]]);
  await second.close();
  server.closeAllConnections();
  await new Promise((resolve) => server.close(resolve));
});

it('keeps telling after the listening connection was cut', async () => {
  const stream = await follow(mara, projectId);
  await app.dataSource.query(
    "SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE application_name = 'hummock events' AND datname = current_database()",
  );
  await client.post(`/api/projects/${projectId}/sheets`, { name: 'While away' });
  await soon(() => changesOf(stream)).toEqual([['sheet', 'made', 1]]);
});

it('says that it lives, and ends at the next check once the person signs out', async () => {
  const person = await makePerson(app, 'Leaver');
  const project = await makeProject(person);
  const stream = await follow(person, project);
  await soon(stream.beats).toBeGreaterThan(1);
  await person.client.post('/api/account/sign-out');
  await expect(Promise.race([stream.ended.then(() => 'ended'), after(15_000)])).resolves.toBe('ended');
});

it('ends at the next check once the person is removed from the team', async () => {
  const guest = await makePerson(app, 'Guest');
  await join(app, guest, mara.teamId, 'viewer');
  const stream = await follow(guest, projectId);
  await app.dataSource.query('DELETE FROM membership WHERE team_id = $1 AND person_id = $2', [
    mara.teamId,
    guest.me.id,
  ]);
  await expect(Promise.race([stream.ended.then(() => 'ended'), after(15_000)])).resolves.toBe('ended');
});

it('is not there for another team', async () => {
  const stranger = await makePerson(app, 'Stranger');
  expect((await follow(stranger, projectId)).status).toBe(404);
  expect((await app.client().get(`/api/projects/${projectId}/events`)).status).toBe(401);
});

const after = (ms: number) => new Promise<string>((resolve) => setTimeout(resolve, ms, 'still open'));

/** Another server on the same database, with the same secret. */
function secondApp(): App {
  return createApp({
    dataSource: app.dataSource,
    databaseUrl: (app.dataSource.options as { url: string }).url,
    jobs: graphileJobs,
    logger: pino({ level: 'silent' }),
    secret: TEST_SECRET,
    publicUrl: () => app.url,
    clientDir: 'tests/fixtures/no-client',
    trustProxy: false,
  });
}
