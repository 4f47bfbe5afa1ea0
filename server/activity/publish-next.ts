import type { EntityManager } from 'typeorm';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { lockRow } from '../database/edit-row.js';
import type { EditableRow } from '../database/entities/editable-row.js';
import { recordChange } from './record-change.js';
import type { EditableKind, EditBy } from './recorded-edits.js';

interface Published {
  readonly newest: { readonly number: number };
}

/**
 * The next numbered version of a setup or a limit set: `insert` writes it, the row's own version rises with it, and
 * the lock on the row gives two people who publish at once two numbers.
 */
export async function publishNext<Row extends EditableRow, View extends Published>(
  manager: EntityManager,
  { noun, entity, view }: EditableKind<Row, View>,
  { actor, grant, id, version }: EditBy,
  insert: (row: Row, number: number) => Promise<void>,
): Promise<View> {
  const row = await lockRow(manager, entity, id);
  if (row.deletedAt) throw new AppError('not-found', text.server.notFound);
  const current = await view(manager, id);
  if (version !== undefined && version !== row.version)
    throw new AppError('version-conflict', text.server.versionConflict, { current });
  const { number } = current.newest;
  await insert(row, number + 1);
  const after = await manager.save(Object.assign(row, { updatedAt: new Date() }));
  const { teamId, projectId } = grant;
  await recordChange(manager, {
    ...{ actor, action: `${noun}:update`, entity: noun, entityId: id, version: after.version, teamId, projectId },
    from: { newest: number },
    to: { newest: number + 1 },
  });
  return view(manager, id);
}
