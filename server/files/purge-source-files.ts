import type { DataSource, EntityManager } from 'typeorm';
import type { FileStore } from './file-store.js';

const STEP = 200; // files of one transaction
const UNUSED = 'NOT EXISTS (SELECT 1 FROM sweep s WHERE s.source_file_id = f.id)';

/** Removes the files made before a time that no sweep names any more, row and bytes. Answers how many. */
export async function purgeSourceFiles(dataSource: DataSource, files: FileStore, madeBefore: Date): Promise<number> {
  let removed = 0;
  for (let step = STEP; step === STEP; removed += step) {
    step = await dataSource.transaction((manager) => purgeSome(manager, files, madeBefore));
  }
  return removed;
}

/**
 * The rows are locked first and looked at again with a statement of its own: an upload of the same content may have
 * taken one up meanwhile, and its new sweep would go with the file.
 */
async function purgeSome(manager: EntityManager, files: FileStore, madeBefore: Date): Promise<number> {
  const locked: { id: string }[] = await manager.query(
    `SELECT f.id FROM source_file f WHERE f.created_at < $1 AND ${UNUSED} ORDER BY f.id LIMIT ${STEP}
     FOR UPDATE SKIP LOCKED`,
    [madeBefore],
  );
  const ids = locked.map(({ id }) => id);
  const unused: { id: string }[] = await manager.query(
    `SELECT f.id FROM source_file f WHERE f.id = ANY ($1) AND ${UNUSED}`,
    [ids],
  );
  const gone = unused.map(({ id }) => id);
  await files.remove(manager, gone);
  await manager.query('DELETE FROM source_file WHERE id = ANY ($1)', [gone]);
  return ids.length;
}
