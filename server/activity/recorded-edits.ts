import type { EntityManager, EntityTarget } from 'typeorm';
import { editRow } from '../database/edit-row.js';
import type { EditableRow } from '../database/entities/editable-row.js';
import type { Grant } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { changedFields, recordChange } from './record-change.js';

/** A kind of row that people change, bin and restore, with every change in the activity. */
export interface EditableKind<Row extends EditableRow, View> {
  readonly noun: 'sweep' | 'sheet' | 'result' | 'setup' | 'limit-set'; // of its actions and its contract
  readonly entity: EntityTarget<Row>;
  readonly view: (manager: EntityManager, id: string) => Promise<View>; // as its contract shows it
  readonly told: (row: Row) => Record<string, unknown>; // what the activity says of it, by the contract's names
}
export interface EditBy {
  readonly actor: Actor;
  readonly grant: Grant;
  readonly id: string;
  readonly version: number | undefined; // that the edit started from; undefined: any
}

const aboutOf = (noun: string, { actor, grant }: Pick<EditBy, 'actor' | 'grant'>, row: EditableRow) => ({
  actor,
  entity: noun,
  entityId: row.id,
  version: row.version,
  teamId: grant.teamId,
  projectId: grant.projectId,
});

export async function recordMade<Row extends EditableRow, View>(
  manager: EntityManager,
  { noun, told }: EditableKind<Row, View>,
  by: Pick<EditBy, 'actor' | 'grant'>,
  row: Row,
): Promise<void> {
  await recordChange(manager, { ...aboutOf(noun, by, row), action: `${noun}:create`, from: null, to: told(row) });
}

/** Changes fields; the same values again make no version and no record. */
export async function changeRow<Row extends EditableRow, View>(
  manager: EntityManager,
  { noun, entity, view, told }: EditableKind<Row, View>,
  by: EditBy,
  changes: Partial<Row>,
): Promise<View> {
  const { id, version } = by;
  const { before, after } = await editRow(manager, { entity, id, version, changes, view: () => view(manager, id) });
  const fields = changedFields(told(before), told(after));
  if (after.version > before.version)
    await recordChange(manager, { ...aboutOf(noun, by, after), action: `${noun}:update`, ...fields });
  return view(manager, id);
}

/** Into the bin. */
export async function binRow<Row extends EditableRow, View>(
  manager: EntityManager,
  { noun, entity, view, told }: EditableKind<Row, View>,
  by: EditBy,
): Promise<View> {
  const { id, version } = by;
  const changes = { deletedAt: new Date() } as Partial<Row>;
  const { after } = await editRow(manager, { entity, id, version, changes, view: () => view(manager, id) });
  await recordChange(manager, { ...aboutOf(noun, by, after), action: `${noun}:delete`, from: told(after), to: null });
  return view(manager, id);
}

/** Out of the bin; a row that is not in it stays as it is. */
export async function unbinRow<Row extends EditableRow, View>(
  manager: EntityManager,
  { noun, entity, view, told }: EditableKind<Row, View>,
  by: EditBy,
): Promise<View> {
  const { id, version } = by;
  const changes = { deletedAt: null } as Partial<Row>;
  const edit = { entity, id, version, changes, inBin: true, view: () => view(manager, id) };
  const { before, after } = await editRow(manager, edit);
  if (before.deletedAt)
    await recordChange(manager, {
      ...aboutOf(noun, by, after),
      action: `${noun}:restore`,
      from: null,
      to: told(after),
    });
  return view(manager, id);
}
