import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import { SessionCookies } from './account/cookies.js';
import { keysFrom } from './account/keys.js';
import { AccountService } from './account/service.js';
import { Sessions } from './account/sessions.js';
import type { Jobs } from './jobs/jobs.js';
import { MeService } from './me/service.js';
import { type Allowance, type AllowanceName, RateLimits } from './middleware/rate-limits.js';
import { Access } from './permissions/access.js';

/** What an app is made from: real parts in main.ts, the same with a clock of their own in the tests. */
export interface AppInputs {
  readonly dataSource: DataSource;
  readonly databaseUrl: string; // for what needs a connection of its own: LISTEN
  readonly jobs: Jobs;
  readonly logger: Logger;
  readonly secret: string;
  readonly publicUrl: () => string; // known once the port is
  readonly clientDir: string;
  readonly trustProxy: string | number | false;
  readonly now?: () => Date;
  readonly beatMs?: number; // between two checks of an open event stream
  readonly allowances?: Partial<Record<AllowanceName, Allowance>>;
}

export interface AppParts extends AppInputs {
  readonly now: () => Date;
  readonly access: Access;
  readonly sessions: Sessions;
  readonly cookies: SessionCookies;
  readonly account: AccountService;
  readonly me: MeService;
  readonly limits: RateLimits;
  readonly isSecure: () => boolean; // whether people reach this server by TLS
  /** What has to end before the server does: open streams, worker threads. */
  readonly onClose: (end: () => Promise<void> | void) => void;
}

const LOOPBACK_NAMES = new Set(['localhost', '127.0.0.1', '[::1]']);

export function makeParts(inputs: AppInputs, onClose: AppParts['onClose']): AppParts {
  const { dataSource, jobs, publicUrl } = inputs;
  const now = inputs.now ?? (() => new Date());
  const keys = keysFrom(inputs.secret);
  const isSecure = () => !LOOPBACK_NAMES.has(new URL(publicUrl()).hostname);
  const sessions = new Sessions(dataSource, keys, now);
  return {
    ...inputs,
    now,
    isSecure,
    sessions,
    onClose,
    access: new Access(dataSource),
    cookies: new SessionCookies(keys, isSecure),
    account: new AccountService(dataSource, sessions, jobs, keys, now),
    me: new MeService(dataSource),
    limits: new RateLimits(dataSource, inputs.allowances),
  };
}
