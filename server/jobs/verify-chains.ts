import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import { verifyChain } from '../activity/chain.js';

/** Walks the history of every team and person; logs each that does not hold, and answers how many these are. */
export async function verifyChains(dataSource: DataSource, logger: Logger): Promise<number> {
  const chains: { id: string }[] = await dataSource.query(
    'SELECT id FROM team UNION SELECT chain_id FROM activity_head UNION SELECT chain_id FROM activity ORDER BY 1',
  );
  let faults = 0;
  for (const { id } of chains) {
    const verdict = await verifyChain(dataSource.manager, id);
    if (verdict.intact) continue;
    faults += 1;
    const { sequence, reason } = verdict;
    logger.error({ part: 'activity', event: 'chain-fault', chainId: id, sequence, reason }, 'history does not hold');
  }
  logger.info({ part: 'activity', event: 'chains-verified', chains: chains.length, faults }, 'history verified');
  return faults;
}
