import type { EntityManager, EntityTarget, FindOptionsWhere } from 'typeorm';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import type { EditableRow } from './entities/editable-row.js';

/** Waits for the row and locks it to the end of the transaction: between two editors the database decides. */
export async function lockRow<Row extends EditableRow>(
  manager: EntityManager,
  entity: EntityTarget<Row>,
  id: string,
): Promise<Row> {
  const where = { id } as FindOptionsWhere<Row>;
  const row = await manager.findOne(entity, { where, lock: { mode: 'for_no_key_update' } }); // rows that only refer to it need not wait
  if (!row) throw new AppError('not-found', text.server.notFound);
  return row;
}

export interface Edit<Row extends EditableRow, View> {
  readonly entity: EntityTarget<Row>;
  readonly id: string;
  readonly version: number | undefined; // undefined: any
  readonly changes: Partial<Row>;
  readonly view: (row: Row) => View | Promise<View>; // the row as its contract: what a refused editor is shown
  readonly inBin?: boolean; // also rows that lie in the bin
}

/**
 * Changes a row if it still has the version that the edit started from; otherwise `version-conflict`, with the row as
 * it is now (`current`) and what was asked for (`yours`). Answers the row before and after.
 */
export async function editRow<Row extends EditableRow, View>(
  manager: EntityManager,
  edit: Edit<Row, View>,
): Promise<{ before: Row; after: Row }> {
  const row = await lockRow(manager, edit.entity, edit.id);
  if (row.deletedAt && !edit.inBin) throw new AppError('not-found', text.server.notFound);
  if (edit.version !== undefined && edit.version !== row.version) {
    const detail = { current: await edit.view(row), yours: edit.changes };
    throw new AppError('version-conflict', text.server.versionConflict, detail);
  }
  const before = Object.assign(Object.create(Object.getPrototypeOf(row)), row) as Row;
  const changes = Object.fromEntries(Object.entries(edit.changes).filter(([, value]) => value !== undefined));
  const after = await manager.save(Object.assign(row, changes));
  return { before, after };
}
