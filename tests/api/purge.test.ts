import { expect, it } from 'vitest';
import { verifyChain } from '../../server/activity/chain.js';
import { purgeBin } from '../../server/jobs/purge-bin.js';
import { startApp } from './support/app.js';
import { makePerson } from './support/people.js';
import { makeWorld } from './support/world.js';

const app = await startApp();
const { manager } = app.dataSource;
const DAY_MS = 86_400_000;
const inDays = (days: number) => new Date(Date.now() + days * DAY_MS);

async function world() {
  const { me, teamId } = await makePerson(app, 'Purger');
  return app.dataSource.transaction((inside) => makeWorld(inside, teamId, me.id));
}
const count = async (table: string, column: string, id: string) =>
  (await manager.query(`SELECT count(*)::int AS n FROM ${table} WHERE ${column} = $1`, [id]))[0].n as number;
const bin = (table: string, id: string) => manager.query(`UPDATE ${table} SET deleted_at = now() WHERE id = $1`, [id]);

it('keeps what was deleted 89 days ago and removes it after 90, bytes and points included', async () => {
  const { teamId, sweepId, sourceId, revisionId } = await world();
  await bin('sweep', sweepId);
  await purgeBin(app.dataSource, inDays(89));
  expect(await count('sweep', 'id', sweepId)).toBe(1);
  expect(await count('source_chunk', 'source_file_id', sourceId)).toBe(1);

  await purgeBin(app.dataSource, inDays(91));
  expect(await count('sweep', 'id', sweepId)).toBe(0);
  expect(await count('sweep_points', 'revision_id', revisionId)).toBe(0);
  expect(await count('source_file', 'id', sourceId)).toBe(0);
  expect(await count('source_chunk', 'source_file_id', sourceId)).toBe(0);
  const [row] = await manager.query(`SELECT * FROM activity WHERE entity_id = $1 AND action = 'bin:purge'`, [sweepId]);
  expect(row).toMatchObject({ actor_id: null, change: 'deleted', from: { name: 'S' }, to: null });
  expect((await verifyChain(manager, teamId)).intact).toBe(true);
});

it('never touches what is not in the bin, however old', async () => {
  const ids = await world();
  await purgeBin(app.dataSource, inDays(4000));
  for (const [table, id] of [
    ['project', ids.projectId],
    ['sweep', ids.sweepId],
    ['source_file', ids.sourceId],
    ['setup', ids.setupId],
  ] as const) {
    expect([table, await count(table, 'id', id)]).toEqual([table, 1]);
  }
});

it('removes a project with all that it holds', async () => {
  const ids = await world();
  await bin('project', ids.projectId);
  await purgeBin(app.dataSource, inDays(91));
  for (const [table, id] of [
    ['project', ids.projectId],
    ['item', ids.itemId],
    ['sheet', ids.sheetId],
    ['result', ids.resultId],
    ['source_file', ids.sourceId],
  ] as const) {
    expect([table, await count(table, 'id', id)]).toEqual([table, 0]);
  }
});

it('keeps a setup that a kept result was made with', async () => {
  const ids = await world();
  await bin('setup', ids.setupId);
  await purgeBin(app.dataSource, inDays(91));
  expect(await count('setup', 'id', ids.setupId)).toBe(1);
  await manager.query('DELETE FROM result WHERE id = $1', [ids.resultId]);
  await purgeBin(app.dataSource, inDays(91));
  expect(await count('setup', 'id', ids.setupId)).toBe(0);
});

it('removes more than one transaction takes', async () => {
  const { projectId } = await world();
  await manager.query(
    `INSERT INTO item (project_id, kind, name, serial, note, published, version, deleted_at)
      SELECT $1, 'part', 'C' || i, '', '', '{}', 1, now() FROM generate_series(1, 450) i`,
    [projectId],
  );
  expect(await purgeBin(app.dataSource, inDays(91))).toBe(450);
});
