import { createHash, randomUUID } from 'node:crypto';
import { expect, it } from 'vitest';
import { calculatorById } from '../../calculators/index.js';
import type { Problem } from '../../shared/contracts/problem.js';
import { CreateResultSchema, type Result, ResultPageSchema, ResultSchema } from '../../shared/contracts/result.js';
import type { SweepRow } from '../../shared/contracts/sweep.js';
import type { Output } from '../../shared/output.js';
import { resultIdentity } from '../../shared/result-identity.js';
import { startApp } from './support/app.js';
import { makeProject, tableOf, uploaded } from './support/measured.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client } = mara;
const projectId = await makeProject(mara);
const results = `/api/projects/${projectId}/results`;
const { version: calculatorVersion, settingsVersion } = calculatorById('driver-fit')!;
let sweeps = 0;
function newSweep(): Promise<SweepRow> {
  sweeps += 1;
  return uploaded(client, projectId, tableOf(5 + sweeps / 100));
}

const output: Output = {
  summary: 'fs is known to 0.1 Hz.',
  figures: [{ id: 'fs', value: 48.1, unit: 'Hz', uncertainty: 0.05, dof: 500 }],
  traces: [
    { id: 'fit', label: 'Fit', x: [20, 40], re: [6, 7], im: [0.1, -0.2], xUnit: 'Hz', yUnit: 'ohm', axis: 'impedance' },
  ],
  markers: [{ frequency: 48.1, label: 'fs' }],
  findings: [{ code: 'no-phase', severity: 'info', message: 'The sweep has no phase.' }],
  tables: [],
};
function inputOf(sweep: SweepRow, role = 'free-air') {
  const { id: revisionId, pointsSha256 } = sweep.revision;
  return { role, sweepId: sweep.id, revisionId, pointsSha256, keys: {}, prepSteps: [] };
}
function resultOf(sweep: SweepRow, more: Record<string, unknown> = {}): Record<string, unknown> {
  const made = { calculatorId: 'driver-fit', calculatorVersion, settings: {}, settingsVersion, output };
  return { ...made, inputs: [inputOf(sweep)], ...more };
}
async function keep(sweep: SweepRow, more: Record<string, unknown> = {}): Promise<Result> {
  const { status, body } = await client.post<Result>(results, resultOf(sweep, more));
  expect([status, body]).toEqual([201, expect.anything()]);
  return ResultSchema.parse(body);
}
async function issuesOf(body: Record<string, unknown>): Promise<string[]> {
  const answer = await client.post<Problem>(results, body);
  expect([answer.status, answer.body.code]).toEqual([400, 'validation-failed']);
  return (answer.body.issues ?? []).map(({ path }) => path);
}
async function reasons(result: Result) {
  return (await client.get<Result>(`/api/results/${result.id}`)).body.outOfDate;
}

it('keeps a result with all that went in, and names it by the hash of that', async () => {
  const sweep = await newSweep();
  const result = await keep(sweep, { name: 'MW-03' });
  expect(result).toMatchObject({ name: 'MW-03', output, seed: 1, outOfDate: [], projectId });
  expect(result.createdBy).toEqual({ id: mara.me.id, name: 'Mara' });
  const identity = resultIdentity(CreateResultSchema.parse(resultOf(sweep)));
  expect(result.inputsSha256).toBe(createHash('sha256').update(identity).digest('hex'));
  expect((await client.get(`/api/results/${result.id}`)).body).toEqual(result);
});

it('refuses points that are not those of the reading', async () => {
  const sweep = await newSweep();
  const inputs = [{ ...inputOf(sweep), pointsSha256: 'f'.repeat(64) }];
  expect(await issuesOf(resultOf(sweep, { inputs }))).toEqual(['inputs.0.pointsSha256']);
});

it('refuses readings of another sweep, of another project, of none and of a sweep in the bin', async () => {
  const [one, two, binned] = [await newSweep(), await newSweep(), await newSweep()];
  const elsewhere = await makeProject(mara, 'Elsewhere');
  const other = await uploaded(client, elsewhere, tableOf(9));
  await client.delete(`/api/sweeps/${binned.id}`);
  const inputs = [
    { ...inputOf(one), sweepId: two.id },
    inputOf(other),
    { ...inputOf(one), revisionId: randomUUID() },
    inputOf(binned),
    inputOf(two),
  ];
  expect(await issuesOf(resultOf(one, { inputs }))).toEqual([
    'inputs.0.sweepId',
    'inputs.1.revisionId',
    'inputs.2.revisionId',
    'inputs.3.revisionId',
  ]);
});

it('refuses a calculator, a version, a setting, a sheet, an item and a setup that are not here', async () => {
  const sweep = await newSweep();
  expect(await issuesOf(resultOf(sweep, { calculatorId: 'horoscope' }))).toEqual(['calculatorId']);
  const newer = { calculatorVersion: calculatorVersion + 1 };
  expect(await issuesOf(resultOf(sweep, newer))).toEqual(['calculatorVersion']);
  expect(await issuesOf(resultOf(sweep, { settings: { coil: 'gold' } }))).toEqual(['settings.coil']);
  const places = { sheetId: randomUUID(), itemId: randomUUID(), setupVersionId: randomUUID() };
  expect(await issuesOf(resultOf(sweep, places))).toEqual(['sheetId', 'itemId', 'setupVersionId']);
});

it('refuses an output that is not one: undeclared figures, gaps in curves, curves of two lengths', async () => {
  const sweep = await newSweep();
  const [trace] = output.traces;
  const wrong: unknown[] = [
    { ...output, figures: [{ id: 'luck', value: 7, unit: '1' }] },
    { ...output, traces: [{ ...trace, re: [6, null] }] },
    { ...output, traces: [{ ...trace, re: [6, 'NaN'] }] },
    { ...output, traces: [{ ...trace, re: [6] }] },
  ];
  for (const given of wrong) expect(await issuesOf(resultOf(sweep, { output: given }))).toEqual(['output']);
  const notANumber = JSON.stringify(resultOf(sweep)).replace('48.1', 'NaN');
  expect((await client.post<Problem>(results, notANumber)).body.code).toBe('validation-failed');
  const beyond = JSON.stringify(resultOf(sweep)).replace('48.1', '1e999');
  expect((await client.post<Problem>(results, beyond)).body.code).toBe('validation-failed');
});

it('refuses a result of more than 16 MB', async () => {
  const sweep = await newSweep();
  const x = Array.from({ length: 1_200_000 }, (_, i) => i + 0.123456789);
  const traces = [{ id: 'long', label: 'Long', x, y: x, xUnit: 'Hz', yUnit: 'ohm', axis: 'other' }];
  const { status, body } = await client.post<Problem>(results, resultOf(sweep, { output: { ...output, traces } }));
  expect([status, body.code]).toEqual([413, 'too-large']);
});

it('lists the newest first, by sheet, by item and by sweep', async () => {
  const project = await makeProject(mara, 'Lists');
  const [one, two] = [await uploaded(client, project, tableOf(3)), await uploaded(client, project, tableOf(4))];
  const sheet = await client.post(`/api/projects/${project}/sheets`, { name: 'Sheet' });
  const item = await client.post(`/api/projects/${project}/items`, { kind: 'driver', name: 'MW-01' });
  const path = `/api/projects/${project}/results`;
  const ids: string[] = [];
  const kept = [
    resultOf(one, { sheetId: sheet.body.id }),
    resultOf(two, { itemId: item.body.id }),
    resultOf(one, { inputs: [inputOf(one), inputOf(two, 'added-mass')] }),
  ];
  for (const result of kept) ids.push((await client.post<Result>(path, result)).body.id);
  const listed = async (query: string) =>
    ResultPageSchema.parse((await client.get(`${path}?${query}`)).body).items.map(({ id }) => ids.indexOf(id));
  expect(await listed('')).toEqual([2, 1, 0]);
  expect(await listed(`sheetId=${sheet.body.id}`)).toEqual([0]);
  expect(await listed(`itemId=${item.body.id}`)).toEqual([1]);
  expect(await listed(`sweepId=${one.id}`)).toEqual([2, 0]);
  expect(await listed(`sweepId=${two.id}`)).toEqual([2, 1]);
  expect((await client.get(`${path}?sweepId=all`)).status).toBe(400);
});

it('is out of date once its sweep is read anew with other points, and names what changed', async () => {
  const sweep = await newSweep();
  const result = await keep(sweep);
  expect(await reasons(result)).toEqual([]);
  const reading = { columns: ['frequency', 'real', 'imaginary'] };
  await client.post(`/api/sweeps/${sweep.id}/revisions`, { reading }); // the same points, told by a person
  expect(await reasons(result)).toEqual([]);
  await client.post(`/api/sweeps/${sweep.id}/revisions`, { reading: { frequencyUnit: 'kHz' } });
  expect(await reasons(result)).toEqual([{ what: 'reading', sweepId: sweep.id, from: '1', to: '3' }]);
  expect((await client.get<Result>(`/api/results/${result.id}`)).body.output).toEqual(output);
});

it('is out of date while its sweep is in the bin', async () => {
  const sweep = await newSweep();
  const result = await keep(sweep);
  await client.delete(`/api/sweeps/${sweep.id}`);
  expect(await reasons(result)).toEqual([{ what: 'sweep-deleted', sweepId: sweep.id, from: '1', to: '' }]);
  await client.post(`/api/sweeps/${sweep.id}/restore`);
  expect(await reasons(result)).toEqual([]);
});

it('is out of date once a sweep is gone for good, and still says what it was', async () => {
  const sweep = await newSweep();
  const result = await keep(sweep);
  await app.dataSource.query('DELETE FROM sweep WHERE id = $1', [sweep.id]);
  expect(await reasons(result)).toEqual([{ what: 'sweep-deleted', sweepId: sweep.id, from: '0', to: '' }]);
});

it('is out of date once its calculator or its setup has a newer version', async () => {
  const sweep = await newSweep();
  const setup = await client.post<{ id: string; newest: { id: string } }>(`/api/teams/${mara.teamId}/setups`, {
    name: 'House fit',
    calculatorId: 'driver-fit',
    settings: {},
  });
  const result = await keep(sweep, { setupVersionId: setup.body.newest.id });
  expect(await reasons(result)).toEqual([]);
  await client.post(`/api/setups/${setup.body.id}/versions`, { settings: { robust: false } });
  expect(await reasons(result)).toEqual([{ what: 'setup', from: '1', to: '2' }]);
  const registered: { version: number } = calculatorById('driver-fit')!;
  registered.version += 1; // as a release does that changes results
  const older = { what: 'calculator', from: String(calculatorVersion), to: String(calculatorVersion + 1) };
  expect(await reasons(result)).toEqual([older, { what: 'setup', from: '1', to: '2' }]);
  registered.version = calculatorVersion;
});

it('changes its name only, with the version it started from; goes into the bin and comes back', async () => {
  const result = await keep(await newSweep());
  const path = `/api/results/${result.id}`;
  expect((await client.patch(path, { name: 'Better name' }, 1)).body).toMatchObject({
    name: 'Better name',
    version: 2,
  });
  expect((await client.patch<Problem>(path, { name: 'Late' }, 1)).body.code).toBe('version-conflict');
  expect((await client.patch(path, { name: 'x', output }, 2)).status).toBe(400);
  expect((await client.delete(path, 2)).status).toBe(204);
  expect((await client.get(path)).status).toBe(404);
  expect((await client.post(`${path}/restore`)).body).toMatchObject({ version: 4, output });
});

it('is not there for another team and not to be kept by a viewer', async () => {
  const sweep = await newSweep();
  const result = await keep(sweep);
  const path = `/api/results/${result.id}`;
  const stranger = await makePerson(app, 'Stranger');
  const tries = [
    stranger.client.get(results),
    stranger.client.post(results, resultOf(sweep)),
    stranger.client.get(path),
    stranger.client.patch(path, { name: 'x' }, 1),
    stranger.client.delete(path),
    stranger.client.post(`${path}/restore`),
  ];
  expect((await Promise.all(tries)).map(({ status }) => status)).toEqual(Array(6).fill(404));
  const viewer = await makePerson(app, 'Viewer');
  await join(app, viewer, mara.teamId, 'viewer');
  expect((await viewer.client.get(path)).status).toBe(200);
  expect((await viewer.client.post(results, resultOf(sweep))).status).toBe(403);
});
