import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { ENTITIES, MIGRATIONS, makeDataSource } from '../../server/database/data-source.js';
import { makeDatabase } from './support/database.js';
import { makeWorld } from './support/world.js';

const database = await makeDatabase({ migrated: false });
const dataSource = makeDataSource(database.url, 3);
beforeAll(() => dataSource.initialize());
afterAll(async () => {
  await dataSource.destroy();
  await database.drop();
});

const drift = async (source: DataSource): Promise<string[]> => {
  const { upQueries } = await source.driver.createSchemaBuilder().log();
  return upQueries.map(({ query }) => query);
};

async function tables(): Promise<string[]> {
  const rows: { name: string }[] = await dataSource.query(
    `SELECT table_name AS name FROM information_schema.tables
      WHERE table_schema = 'public' AND table_name <> 'migration' ORDER BY 1`,
  );
  return rows.map(({ name }) => name);
}

/** Row count and a checksum of every column, over the rows in the order of their text. */
async function checksums(): Promise<Record<string, string>> {
  const columns: { table_name: string; column_name: string }[] = await dataSource.query(
    `SELECT table_name, column_name FROM information_schema.columns
      WHERE table_schema = 'public' AND table_name <> 'migration' ORDER BY 1, 2`,
  );
  const sums: Record<string, string> = {};
  for (const { table_name: table, column_name: column } of columns) {
    const [row] = await dataSource.query(
      `SELECT count(*) AS n, md5(coalesce(string_agg(v, '|' ORDER BY v), '')) AS sum
        FROM (SELECT coalesce("${column}"::text, '∅') AS v FROM "${table}") x`,
    );
    sums[`${table}.${column}`] = `${row.n} ${row.sum}`;
  }
  return sums;
}

/** Data as it stands after a while of use, in every table. */
async function fill(): Promise<void> {
  await dataSource.transaction(async (manager) => {
    const [person] = await manager.query(
      `INSERT INTO person (email, name, password_hash, preferences, version) VALUES ('a@example.test', 'Ω', 'x', '{"units":"inch"}', 3) RETURNING id`,
    );
    const [team] = await manager.query(`INSERT INTO team (name, rules, version) VALUES ('T', '{}', 1) RETURNING id`);
    await manager.query(`INSERT INTO membership (team_id, person_id, role, version) VALUES ($1, $2, 'owner', 1)`, [
      team.id,
      person.id,
    ]);
    await manager.query(
      `INSERT INTO session (person_id, device, salt, generation, rotated_at, last_used_at, expires_at)
        VALUES ($1, 'd', 's', 1, now(), now(), now())`,
      [person.id],
    );
    await manager.query(
      `INSERT INTO mail_code (person_id, purpose, code_sha256, expires_at) VALUES ($1, 'verify', repeat('a', 64), now())`,
      [person.id],
    );
    await manager.query(`INSERT INTO notice (person_id, team_id, kind, subject) VALUES ($1, $2, 'new-device', '{}')`, [
      person.id,
      team.id,
    ]);
    await manager.query(`INSERT INTO rate_limit VALUES ('k', 1, 2)`);
    await makeWorld(manager, team.id, person.id);
  });
}

it('goes up, down and up again, and each state has exactly its tables', async () => {
  await dataSource.runMigrations();
  const up = await tables();
  expect(up).toEqual(ENTITIES.map((entity) => dataSource.getMetadata(entity).tableName).sort());
  for (const _ of MIGRATIONS) await dataSource.undoLastMigration();
  expect(await tables()).toEqual([]);
  await dataSource.runMigrations();
  expect(await tables()).toEqual(up);
});

it('leaves no drift between the migrations and the entities', async () => {
  expect(await drift(dataSource)).toEqual([]);
});

it.each([
  [
    'a column that is missing',
    'ALTER TABLE item DROP COLUMN serial',
    `ALTER TABLE item ADD COLUMN serial text NOT NULL`,
  ],
  ['an index that is missing', 'DROP INDEX sweep_item_id_idx', 'CREATE INDEX sweep_item_id_idx ON sweep (item_id)'],
  [
    'a column of another type',
    'ALTER TABLE sweep_revision ALTER points TYPE bigint',
    'ALTER TABLE sweep_revision ALTER points TYPE int',
  ],
  [
    'a foreign key that is missing',
    'ALTER TABLE item DROP CONSTRAINT item_project_id_fkey',
    'ALTER TABLE item ADD FOREIGN KEY (project_id) REFERENCES project ON DELETE CASCADE',
  ],
])('would notice %s', async (_, harm, repair) => {
  await dataSource.query(harm);
  expect(await drift(dataSource)).not.toEqual([]);
  await dataSource.query(repair);
  expect(await drift(dataSource)).toEqual([]);
});

it('keeps row counts and checksums of every column that survives each step down and up', async () => {
  await fill();
  const full = await checksums();
  expect(Object.values(full).filter((sum) => sum.startsWith('0 '))).toEqual([]); // every table holds something
  for (let down = MIGRATIONS.length - 1; down >= 1; down -= 1) await dataSource.undoLastMigration();
  const survived = await checksums(); // down to the first migration: what it made holds all it held
  for (const [column, sum] of Object.entries(survived)) expect([column, sum]).toEqual([column, full[column] ?? sum]);
  await dataSource.runMigrations();
  const again = await checksums();
  for (const column of Object.keys(survived)) expect([column, again[column]]).toEqual([column, full[column]]);
  expect(Object.keys(again)).toEqual(Object.keys(full));
});

it('indexes every foreign key, and each says what happens on deletion', async () => {
  const keys: { name: string; action: string; indexed: boolean }[] = await dataSource.query(
    `SELECT c.conname AS name, c.confdeltype AS action, EXISTS (
        SELECT 1 FROM pg_index i WHERE i.indrelid = c.conrelid AND i.indpred IS NULL
          AND (i.indkey::int2[])[0:array_length(c.conkey, 1) - 1] = c.conkey) AS indexed
      FROM pg_constraint c WHERE c.contype = 'f' AND c.connamespace = 'public'::regnamespace ORDER BY 1`,
  );
  expect(keys.length).toBeGreaterThan(20);
  expect(keys.filter(({ indexed }) => !indexed).map(({ name }) => name)).toEqual([]);
  for (const entity of ENTITIES) {
    for (const key of dataSource.getMetadata(entity).foreignKeys)
      expect([key.name, key.onDelete]).toEqual([key.name, expect.stringMatching(/CASCADE|SET NULL|NO ACTION/)]);
  }
});

it('removes all that a team has when the team itself is removed, and leaves no bytes behind', async () => {
  await dataSource.query('DELETE FROM team');
  for (const table of [
    'project',
    'item',
    'sweep',
    'sweep_revision',
    'sweep_points',
    'source_file',
    'source_chunk',
    'sheet',
    'result',
    'setup',
    'setup_version',
    'limit_set',
    'limit_version',
    'membership',
  ]) {
    const [{ n }] = await dataSource.query(`SELECT count(*)::int AS n FROM ${table}`);
    expect([table, n]).toEqual([table, 0]);
  }
});

it('gives every table that people edit a version, times and a place in the bin', async () => {
  const rows: { table_name: string }[] = await dataSource.query(
    `SELECT table_name FROM information_schema.columns WHERE table_schema = 'public'
      AND column_name IN ('version', 'created_at', 'updated_at', 'deleted_at') GROUP BY 1 HAVING count(*) = 4 ORDER BY 1`,
  );
  expect(rows.map((row) => row.table_name)).toEqual([
    'item',
    'limit_set',
    'person',
    'project',
    'result',
    'setup',
    'sheet',
    'sweep',
    'team',
  ]);
});
