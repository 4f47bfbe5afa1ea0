import { randomUUID } from 'node:crypto';
import { expect, it } from 'vitest';
import type { Problem } from '../../shared/contracts/problem.js';
import { type Sheet, SheetContentSchema, SheetPageSchema, SheetSchema } from '../../shared/contracts/sheet.js';
import { startApp } from './support/app.js';
import { makeProject } from './support/measured.js';
import { join, makePerson } from './support/people.js';

const app = await startApp();
const mara = await makePerson(app, 'Mara');
const { client } = mara;
const projectId = await makeProject(mara);
const sheets = `/api/projects/${projectId}/sheets`;

async function makeSheet(name: string): Promise<Sheet> {
  const { status, body } = await client.post<Sheet>(sheets, { name });
  expect(status).toBe(201);
  return SheetSchema.parse(body);
}

it('makes a sheet with every choice of the chart at its default', async () => {
  const sheet = await makeSheet('Free air');
  expect(sheet).toMatchObject({ name: 'Free air', projectId, version: 1, deletedAt: null });
  expect(sheet.content).toEqual(SheetContentSchema.parse({}));
  expect((await client.get(`/api/sheets/${sheet.id}`)).body).toEqual(sheet);
  const listed = SheetPageSchema.parse((await client.get(sheets)).body);
  expect(listed.items.map(({ id }) => id)).toContain(sheet.id);
});

it('keeps what is drawn, the cursors and the cards, and their history', async () => {
  const sheet = await makeSheet('Cards');
  const sweepId = randomUUID();
  const content = SheetContentSchema.parse({
    drawn: [{ sweepId, lineNumber: 3, isReference: true }],
    frequencyRangeHz: [10, 500],
    cursorAHz: 48.25,
    cards: [
      {
        id: randomUUID(),
        calculatorId: 'driver-fit',
        inputs: { 'free-air': [{ sweepId, keys: {} }] },
        settings: { coil: 'auto' },
      },
    ],
  });
  const changed = await client.patch<Sheet>(`/api/sheets/${sheet.id}`, { content }, 1);
  expect(changed.body).toMatchObject({ version: 2, name: 'Cards', content });
  const [record] = await app.dataSource.query(
    `SELECT "from"->'content' AS before, "to"->'content' AS after FROM activity
     WHERE entity_id = $1 AND action = 'sheet:update'`,
    [sheet.id],
  );
  expect(record).toEqual({ before: sheet.content, after: content });
});

it('refuses an edit of an older version with both sheets, so that the page can merge them', async () => {
  const sheet = await makeSheet('Shared');
  const path = `/api/sheets/${sheet.id}`;
  const mine = { ...sheet.content, cursorAHz: 40 };
  const current = (await client.patch<Sheet>(path, { content: mine }, 1)).body;
  const theirs = { ...sheet.content, cursorBHz: 80 };
  const late = await client.patch<Problem>(path, { content: theirs }, 1);
  expect(late.status).toBe(409);
  expect(late.body.extra).toEqual({ current, yours: { content: theirs } });
  const merged = { ...current.content, cursorBHz: 80 };
  expect((await client.patch<Sheet>(path, { content: merged }, current.version)).body.content).toEqual(merged);
});

it('refuses fields it does not know and a line number beyond the eighth', async () => {
  const sheet = await makeSheet('Strict');
  const drawn = [{ sweepId: randomUUID(), lineNumber: 9 }];
  const wrong = await client.patch<Problem>(`/api/sheets/${sheet.id}`, { content: { drawn, zoom: 2 } }, 1);
  expect(wrong.status).toBe(400);
  expect(wrong.body.issues?.map(({ path }) => path).sort()).toEqual(['content', 'content.drawn.0.lineNumber']);
  expect((await client.post(sheets, { name: '  ' })).status).toBe(400);
});

it('goes into the bin and comes back', async () => {
  const sheet = await makeSheet('Binned');
  const path = `/api/sheets/${sheet.id}`;
  expect((await client.delete(path, 1)).status).toBe(204);
  expect((await client.get(path)).status).toBe(404);
  const { body } = await client.get(sheets);
  expect(SheetPageSchema.parse(body).items.map(({ id }) => id)).not.toContain(sheet.id);
  expect((await client.post(`${path}/restore`)).body).toMatchObject({ id: sheet.id, version: 3, deletedAt: null });
  expect((await client.post(`${path}/restore`)).body).toMatchObject({ version: 3 });
});

it('is not there for another team and not to be changed by a viewer', async () => {
  const sheet = await makeSheet('Ours');
  const path = `/api/sheets/${sheet.id}`;
  const stranger = await makePerson(app, 'Stranger');
  const tries = [
    stranger.client.get(sheets),
    stranger.client.post(sheets, { name: 'x' }),
    stranger.client.get(path),
    stranger.client.patch(path, { name: 'x' }, 1),
    stranger.client.delete(path),
    stranger.client.post(`${path}/restore`),
  ];
  expect((await Promise.all(tries)).map(({ status }) => status)).toEqual(Array(6).fill(404));
  const viewer = await makePerson(app, 'Viewer');
  await join(app, viewer, mara.teamId, 'viewer');
  expect((await viewer.client.get(path)).status).toBe(200);
  expect((await viewer.client.patch(path, { name: 'x' }, 1)).status).toBe(403);
});
