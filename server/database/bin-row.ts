import type { EntityManager, EntityTarget } from 'typeorm';
import { type Edit, editRow, lockRow } from './edit-row.js';
import type { EditableRow } from './entities/editable-row.js';

type Removal<Row extends EditableRow, View> = Pick<Edit<Row, View>, 'entity' | 'id' | 'version' | 'view'>;

/** Puts a row into the bin: it stays whole for 90 days. */
export async function binRow<Row extends EditableRow, View>(
  manager: EntityManager,
  removal: Removal<Row, View>,
): Promise<Row> {
  const changes = { deletedAt: new Date() } as Partial<Row>;
  const { after } = await editRow(manager, { ...removal, changes });
  return after;
}

/** Takes a row out of the bin; one that is not there is answered as it is. */
export async function restoreRow<Row extends EditableRow>(
  manager: EntityManager,
  entity: EntityTarget<Row>,
  id: string,
): Promise<{ row: Row; wasInBin: boolean }> {
  const row = await lockRow(manager, entity, id);
  if (!row.deletedAt) return { row, wasInBin: false };
  row.deletedAt = null;
  return { row: await manager.save(row), wasInBin: true };
}
