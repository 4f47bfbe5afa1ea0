import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { runOnce } from 'graphile-worker';
import { type Logger, pino } from 'pino';
import type { DataSource } from 'typeorm';
import { afterAll } from 'vitest';
import { type App, createApp } from '../../../server/app.js';
import type { AppInputs } from '../../../server/app-parts.js';
import { makeDataSource } from '../../../server/database/data-source.js';
import { graphileJobs, graphileLogger, taskListOf } from '../../../server/jobs/graphile-jobs.js';
import { makeTasks } from '../../../server/jobs/tasks.js';
import type { Letter, Mailer } from '../../../server/mail/mailer.js';
import { Client } from './client.js';
import { makeDatabase } from './database.js';

export const TEST_SECRET = 'a secret of the tests, longer than thirty-two characters';

export interface TestApp {
  readonly url: string;
  readonly dataSource: DataSource;
  readonly app: App;
  /** A browser without cookies yet. */
  client(headers?: Record<string, string>): Client;
  /** Moves the server's clock; the database's stays. */
  advance(milliseconds: number): void;
  /** Runs what waits in the queue and answers the letters that came of it. */
  letters(): Promise<Letter[]>;
}

/** A server on a free port of loopback with a database of its own, gone after the test file. */
export async function startApp(options: Partial<AppInputs> = {}): Promise<TestApp> {
  const database = await makeDatabase();
  const dataSource = await makeDataSource(database.url, 6).initialize();
  let offset = 0;
  let url = '';
  const now = () => new Date(Date.now() + offset);
  const logger: Logger = options.logger ?? pino({ level: 'silent' });
  const app = createApp({
    dataSource,
    databaseUrl: database.url,
    jobs: graphileJobs,
    logger,
    secret: TEST_SECRET,
    publicUrl: () => url,
    clientDir: 'tests/fixtures/no-client',
    trustProxy: false,
    now,
    ...options,
  });
  const server: Server = createServer(app.http);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  afterAll(async () => {
    await app.close();
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
    if (dataSource.isInitialized) await dataSource.destroy();
    await database.drop();
  });

  const sent: Letter[] = [];
  const mailer: Mailer = { send: async (letter) => void sent.push(letter), close: () => {} };
  const taskList = taskListOf(makeTasks({ dataSource, mailer, logger, publicUrl: () => url, now }));
  return {
    url,
    dataSource,
    app,
    client: (headers) => new Client(url, headers),
    advance: (milliseconds) => {
      offset += milliseconds;
    },
    letters: async () => {
      await runOnce({ connectionString: database.url, taskList, logger: graphileLogger(logger) });
      return sent.splice(0);
    },
  };
}
