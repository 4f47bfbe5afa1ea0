import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeDataSource } from '../../server/database/data-source.js';
import { makeDatabase } from './support/database.js';

const database = await makeDatabase({ migrated: false });
const dataSource = makeDataSource(database.url);
beforeAll(() => dataSource.initialize());
afterAll(async () => {
  await dataSource.destroy();
  await database.drop();
});
it('leaves no drift between the migrations and the entities', async () => {
  await dataSource.runMigrations();
  const { upQueries } = await dataSource.driver.createSchemaBuilder().log();
  expect(upQueries.map((query) => query.query)).toEqual([]);
  await dataSource.undoLastMigration();
  await dataSource.runMigrations();
});
