import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { type Logger, pino } from 'pino';
import { text } from '../shared/text.js';
import { createApp } from './app.js';
import { type Config, ConfigError, readConfig } from './config.js';
import { makeDataSource } from './database/data-source.js';
import { seedDemo } from './demo/seed.js';
import { graphileJobs, prepareQueue, startWorker } from './jobs/graphile-jobs.js';
import { makeTasks } from './jobs/tasks.js';
import { startMailSink } from './mail/mail-sink.js';
import { smtpMailer } from './mail/mailer.js';

type Ending = () => Promise<unknown> | unknown;
const STREAMS_MS = 2_000; // how long answers may take to finish when the server ends
const STUCK_MS = 15_000;

/** Starts everything in order and answers how to end it, in the opposite order. */
async function start(config: Config, logger: Logger, endings: Ending[]): Promise<void> {
  const dataSource = await makeDataSource(config.databaseUrl).initialize();
  endings.push(() => dataSource.destroy());
  const migrations = await dataSource.runMigrations();
  if (migrations.length > 0) logger.info({ migrations: migrations.map(({ name }) => name) }, 'migrated');
  await prepareQueue(config.databaseUrl, logger);

  const demo = config.hasDemo ? await seedDemo(dataSource) : undefined;

  const sink = config.smtpUrl ? undefined : await startMailSink(join(config.dataDir, 'mail'), logger);
  if (sink) endings.push(() => sink.close());
  const mailer = smtpMailer(config.smtpUrl ?? sink?.smtpUrl ?? '', config.mailFrom, text.mail.foot);
  endings.push(() => mailer.close());

  let publicUrl = config.publicUrl ?? '';
  const tasks = makeTasks({ dataSource, mailer, logger, publicUrl: () => publicUrl });
  const server = createServer();
  const app = createApp({ ...config, dataSource, logger, jobs: graphileJobs, publicUrl: () => publicUrl });
  server.on('request', app.http);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(config.port, config.host, resolve);
  });
  const { port } = server.address() as AddressInfo;
  publicUrl ||= `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`;
  endings.push(async () => {
    const ended = new Promise((resolve) => server.close(resolve));
    await app.close();
    server.closeIdleConnections();
    const late = setTimeout(() => server.closeAllConnections(), STREAMS_MS);
    await ended;
    clearTimeout(late);
  });
  const worker = await startWorker(config.databaseUrl, tasks, logger);
  endings.push(() => worker.stop());
  const tell = demo ? [text.server.demoSignIn(demo.email, demo.password)] : [];
  logger.info({ event: 'ready', url: publicUrl, port, pid: process.pid, tell }, 'ready');
}

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const logger = pino({ level: config.logLevel, base: null, timestamp: pino.stdTimeFunctions.isoTime });
  const endings: Ending[] = [];
  let isEnding = false;
  const end = async (exitCode: number) => {
    if (isEnding) return; // Ctrl-C arrives twice
    isEnding = true;
    setTimeout(() => process.exit(exitCode || 1), STUCK_MS).unref();
    for (const ending of endings.reverse()) {
      try {
        await ending();
      } catch (error) {
        logger.error({ err: error }, 'ending');
      }
    }
    process.exitCode = exitCode;
    logger.info({ event: 'ended' }, 'ended');
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => void end(0));
  try {
    await start(config, logger, endings);
  } catch (error) {
    logger.fatal({ err: error }, 'could not start');
    await end(1);
  }
}

main().catch((error: unknown) => {
  const isKnown = error instanceof ConfigError;
  process.stderr.write(`${isKnown ? error.message : String((error as Error)?.stack ?? error)}\n`);
  process.exitCode = 1;
});
