import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import { AccountLetters } from '../account/letters.js';
import type { Mailer } from '../mail/mailer.js';
import type { Tasks } from './jobs.js';
import { purgeBin } from './purge-bin.js';
import { verifyChains } from './verify-chains.js';

interface Parts {
  readonly dataSource: DataSource;
  readonly mailer: Mailer;
  readonly logger: Logger;
  readonly publicUrl: () => string;
  readonly now?: () => Date;
}

/** What each job does. */
export function makeTasks({ dataSource, mailer, logger, publicUrl, now = () => new Date() }: Parts): Tasks {
  const letters = new AccountLetters(dataSource, mailer, publicUrl, now);
  return {
    'send-letter': (payload) => letters.send(payload),
    'purge-bin': async () => {
      await purgeBin(dataSource, now());
    },
    'verify-chains': async () => {
      await verifyChains(dataSource, logger);
    },
  };
}
