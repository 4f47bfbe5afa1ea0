import { type DataSource, type EntityManager, QueryFailedError } from 'typeorm';

const DEADLOCK_DETECTED = '40P01';
const TRIES = 3;

/** A transaction that the database may have given up because two waited for each other: it is tried again, whole. */
export async function retriedTransaction<Answer>(
  dataSource: DataSource,
  work: (manager: EntityManager) => Promise<Answer>,
): Promise<Answer> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await dataSource.transaction(work);
    } catch (error) {
      const isDeadlock =
        error instanceof QueryFailedError && (error.driverError as { code?: string }).code === DEADLOCK_DETECTED;
      if (!isDeadlock || attempt === TRIES) throw error;
    }
  }
}
