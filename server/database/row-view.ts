import type { EditableRow } from './entities/editable-row.js';

/** What every editable row carries in its contract. */
export function rowView(row: EditableRow) {
  return {
    id: row.id,
    version: row.version,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}
