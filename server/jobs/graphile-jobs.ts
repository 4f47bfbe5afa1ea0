import { Logger as GraphileLogger, type Runner, run, runMigrations, type TaskList } from 'graphile-worker';
import type { Logger } from 'pino';
import type { Jobs, TaskName, Tasks } from './jobs.js';

/** The queue in the same PostgreSQL, by graphile-worker. */
export const graphileJobs: Jobs = {
  async add(manager, name, payload) {
    await manager.query('SELECT graphile_worker.add_job($1, $2::json, max_attempts := 8)', [
      name,
      JSON.stringify(payload),
    ]);
  },
};

/** Every night; a missed night is made up for at the next start. */
const CRONTAB = '15 3 * * * purge-bin ?fill=1d {}\n45 3 * * * verify-chains ?fill=1d {}';

export function taskListOf(tasks: Tasks): TaskList {
  const entries = (Object.keys(tasks) as TaskName[]).map((name) => {
    const task = tasks[name] as (payload: unknown) => Promise<void>;
    return [name, (payload: unknown) => task(payload)] as const;
  });
  return Object.fromEntries(entries);
}

export function graphileLogger(logger: Logger): GraphileLogger {
  return new GraphileLogger(() => (level, message) => {
    if (level === 'error') logger.error({ part: 'jobs' }, message);
    else if (level === 'warning') logger.warn({ part: 'jobs' }, message);
    else logger.debug({ part: 'jobs' }, message);
  });
}

/** The queue's own tables: there before the first request may ask for a job. */
export function prepareQueue(databaseUrl: string, logger: Logger): Promise<void> {
  return runMigrations({ connectionString: databaseUrl, logger: graphileLogger(logger) });
}

/** Starts the worker in this process. */
export function startWorker(databaseUrl: string, tasks: Tasks, logger: Logger): Promise<Runner> {
  return run({
    connectionString: databaseUrl,
    concurrency: 2,
    maxPoolSize: 4,
    noHandleSignals: true,
    crontab: CRONTAB,
    taskList: taskListOf(tasks),
    logger: graphileLogger(logger),
  });
}
