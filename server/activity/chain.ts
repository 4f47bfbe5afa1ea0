import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { canonicalJson } from '../../shared/canonical-json.js';
import { ActivityEntity, ActivityHeadEntity } from '../database/entities/activity.entity.js';

/** What the first row of a chain names as the hash before it. */
export const FIRST_HASH = '0'.repeat(64);

/** SHA-256, hex, over the canonical JSON of every field of the row but its own hash; the one before is among them. */
export function activityHash(row: Omit<ActivityEntity, 'hash'>): string {
  const { chainId, sequence, at, actorId, action, entity, entityId, entityVersion, change, projectId } = row;
  const { from, to, previousHash } = row;
  const covered = { chainId, sequence, at, actorId, action, entity, entityId, entityVersion, change, projectId };
  return createHash('sha256')
    .update(canonicalJson({ ...covered, from, to, previousHash }))
    .digest('hex');
}

export type ChainVerdict =
  | { intact: true; sequence: number; hash: string }
  | { intact: false; sequence: number; reason: 'altered' | 'missing' | 'tail-cut' };

/**
 * Walks a chain from its first row. `head`, where a person has kept one, is a sequence and hash seen earlier (the
 * newest row of an export): the chain has to contain it. Without it the head kept in the database serves.
 */
export async function verifyChain(
  manager: EntityManager,
  chainId: string,
  head?: { sequence: number; hash: string },
): Promise<ChainVerdict> {
  const known = head ?? (await manager.findOneBy(ActivityHeadEntity, { chainId }));
  let previous = { sequence: 0, hash: FIRST_HASH };
  let headSeen = !known || known.sequence === 0;
  for await (const row of rowsOf(manager, chainId)) {
    if (row.sequence !== previous.sequence + 1) {
      return { intact: false, sequence: previous.sequence + 1, reason: 'missing' };
    }
    if (row.previousHash !== previous.hash || row.hash !== activityHash(row)) {
      return { intact: false, sequence: row.sequence, reason: 'altered' };
    }
    if (known?.sequence === row.sequence) {
      if (known.hash !== row.hash) return { intact: false, sequence: row.sequence, reason: 'altered' };
      headSeen = true;
    }
    previous = row;
  }
  if (!headSeen) return { intact: false, sequence: previous.sequence + 1, reason: 'tail-cut' };
  return { intact: true, sequence: previous.sequence, hash: previous.hash };
}

async function* rowsOf(manager: EntityManager, chainId: string): AsyncGenerator<ActivityEntity> {
  const size = 1000;
  for (let after = 0; ; ) {
    const rows = await manager
      .createQueryBuilder(ActivityEntity, 'a')
      .where('a.chainId = :chainId AND a.sequence > :after', { chainId, after })
      .orderBy('a.sequence')
      .limit(size)
      .getMany();
    yield* rows;
    const last = rows.at(-1);
    if (!last || rows.length < size) return;
    after = last.sequence;
  }
}
