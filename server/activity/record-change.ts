import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import { canonicalJson } from '../../shared/canonical-json.js';
import type { Action } from '../../shared/permissions.js';
import { ActivityEntity, ActivityHeadEntity, type Change } from '../database/entities/activity.entity.js';
import { activityHash, FIRST_HASH } from './chain.js';
import { announce } from './project-events.js';

/** Changes that no role decides: a person's own account, and what the product does by itself. */
export type OwnAction =
  | 'team:create'
  | 'person:register'
  | 'person:verify'
  | 'person:update'
  | 'person:reset-password'
  | 'session:create'
  | 'session:end'
  | 'bin:purge'
  | 'demo:seed';

export interface ChangeRecord {
  readonly actor: { readonly personId: string } | null; // null: the product itself
  readonly action: Action | OwnAction;
  readonly entity: string; // as in the contracts: item, sweep, limit-set …
  readonly entityId: string;
  readonly version: number; // of the row after the change
  readonly teamId: string; // whose chain it goes to; for account changes the person's id
  readonly projectId: string | null; // null: of the whole team
  readonly from: Record<string, unknown> | null; // null: it was made; only the fields that changed are needed
  readonly to: Record<string, unknown> | null; // null: it was deleted
}

/**
 * Writes who changed what into the hash chain of the team and queues the project event, both in the transaction of the
 * change itself. The lock on the chain's head is held to the end of the transaction: changes of one team commit in the
 * order of their sequence. A transaction that changes many rows calls `lockChain` first, and so do the others that may
 * change one of these rows: two then cannot wait for each other.
 */
export async function recordChange(manager: EntityManager, record: ChangeRecord): Promise<void> {
  const head = await lockChain(manager, record.teamId);
  const row = manager.create(ActivityEntity, {
    chainId: record.teamId,
    sequence: head.sequence + 1,
    at: new Date(),
    actorId: record.actor?.personId ?? null,
    action: record.action,
    entity: record.entity,
    entityId: record.entityId,
    entityVersion: record.version,
    change: changeOf(record),
    projectId: record.projectId,
    from: record.from,
    to: record.to,
    previousHash: head.hash,
  });
  row.hash = activityHash(row);
  await manager.insert(ActivityEntity, row as QueryDeepPartialEntity<ActivityEntity>);
  await manager.update(ActivityHeadEntity, { chainId: row.chainId }, { sequence: row.sequence, hash: row.hash });
  await announce(manager, row);
}

export async function lockChain(manager: EntityManager, chainId: string): Promise<ActivityHeadEntity> {
  const beginning = { chainId, sequence: 0, hash: FIRST_HASH };
  await manager.createQueryBuilder().insert().into(ActivityHeadEntity).values(beginning).orIgnore().execute();
  return manager.findOneOrFail(ActivityHeadEntity, { where: { chainId }, lock: { mode: 'pessimistic_write' } });
}

function changeOf({ action, from, to }: ChangeRecord): Change {
  if (action.endsWith(':restore')) return 'restored';
  if (from === null) return 'made';
  return to === null ? 'deleted' : 'changed';
}

/** The fields that differ between two states of a row, before and after. */
export function changedFields<Row extends object>(
  before: Row,
  after: Partial<Row>,
): { from: Record<string, unknown>; to: Record<string, unknown> } {
  const from: Record<string, unknown> = {};
  const to: Record<string, unknown> = {};
  for (const [key, value] of Object.entries(after)) {
    const earlier = before[key as keyof Row];
    if (value === undefined || canonicalJson(earlier ?? null) === canonicalJson(value ?? null)) continue;
    from[key] = earlier;
    to[key] = value;
  }
  return { from, to };
}
