import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { canonicalJson } from '../../shared/canonical-json.js';
import { ActivityEntity, ActivityHeadEntity } from '../database/entities/activity.entity.js';
import { TeamEntity } from '../database/entities/team.entity.js';

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
  | { intact: false; sequence: number; reason: 'altered' | 'missing' | 'tail-cut' | 'past-head' };
interface End {
  readonly sequence: number;
  readonly hash: string;
}

/**
 * Walks a chain from its first row, in one snapshot of the database. The last row has to be the head kept there: rows
 * after it did not come from the product. `head`, where a person has kept one, is a sequence and hash seen earlier (the
 * newest row of an export): the chain has to contain it as well.
 */
export function verifyChain(manager: EntityManager, chainId: string, head?: End): Promise<ChainVerdict> {
  return manager.transaction('REPEATABLE READ', async (snapshot) => {
    const stored = await snapshot.findOneBy(ActivityHeadEntity, { chainId });
    const walked = await walk(snapshot, chainId, head);
    return walked.intact ? endsAt(snapshot, chainId, walked, stored) : walked;
  });
}

async function walk(manager: EntityManager, chainId: string, head: End | undefined): Promise<ChainVerdict> {
  let previous: End = { sequence: 0, hash: FIRST_HASH };
  for await (const row of rowsOf(manager, chainId)) {
    if (row.sequence !== previous.sequence + 1) {
      return { intact: false, sequence: previous.sequence + 1, reason: 'missing' };
    }
    const isHeads = head?.sequence !== row.sequence || head.hash === row.hash;
    if (row.previousHash !== previous.hash || row.hash !== activityHash(row) || !isHeads) {
      return { intact: false, sequence: row.sequence, reason: 'altered' };
    }
    previous = row;
  }
  const { sequence, hash } = previous;
  if (head && head.sequence > sequence) return { intact: false, sequence: sequence + 1, reason: 'tail-cut' };
  return { intact: true, sequence, hash };
}

/** Whether a chain that is whole in itself ends where the database says. A team or rows without a head have lost it. */
async function endsAt(
  manager: EntityManager,
  chainId: string,
  last: ChainVerdict & End,
  stored: End | null,
): Promise<ChainVerdict> {
  const { sequence, hash } = last;
  if (!stored) {
    const isLost = sequence > 0 || (await manager.existsBy(TeamEntity, { id: chainId }));
    return isLost ? { intact: false, sequence: sequence + 1, reason: 'tail-cut' } : last;
  }
  if (stored.sequence > sequence) return { intact: false, sequence: sequence + 1, reason: 'tail-cut' };
  if (stored.sequence < sequence) return { intact: false, sequence: stored.sequence + 1, reason: 'past-head' };
  return stored.hash === hash ? last : { intact: false, sequence, reason: 'altered' };
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
