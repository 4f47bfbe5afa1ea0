import type { DataSource, EntityManager } from 'typeorm';
import type { SweepRow } from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { lockChain } from '../activity/record-change.js';
import type { EditableKind } from '../activity/recorded-edits.js';
import { SweepEntity } from '../database/entities/sweep.entity.js';
import { retriedTransaction } from '../database/retried-transaction.js';
import { violates } from '../database/violates.js';
import type { Grant } from '../permissions/access.js';
import { loadedSweep, toSweep } from './sweep-rows.js';

export const SWEEP: EditableKind<SweepEntity, SweepRow> = {
  noun: 'sweep',
  entity: SweepEntity,
  view: async (manager, id) => toSweep(await loadedSweep(manager, id)),
  told: ({ name, conditions, itemId, groupName: group, tags }) => ({ name, conditions, itemId, group, tags }),
};

/** Only one living sweep for each source file of a project. */
export const LIVE_SOURCE_KEY = 'sweep_source_file_live_key';

/**
 * A transaction that changes sweeps. The lock on the team's activity comes first, so that an edit of one sweep and the
 * undo of its batch cannot wait for each other.
 */
export async function sweepTransaction<Answer>(
  dataSource: DataSource,
  grant: Grant,
  work: (manager: EntityManager) => Promise<Answer>,
): Promise<Answer> {
  try {
    return await retriedTransaction(dataSource, async (manager) => {
      await lockChain(manager, grant.teamId);
      return work(manager);
    });
  } catch (error) {
    if (!violates(error, LIVE_SOURCE_KEY)) throw error;
    throw new AppError('already-here', text.measurements.sourceHereAgain, {}, error);
  }
}
