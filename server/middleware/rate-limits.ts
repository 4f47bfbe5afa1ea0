import { createHash } from 'node:crypto';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import type { DataSource } from 'typeorm';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

/** How many tries in how many seconds. */
export interface Allowance {
  readonly points: number;
  readonly duration: number;
}
const MINUTE = 60;
export const ALLOWANCES = {
  'sign-in-pair': { points: 12, duration: 15 * MINUTE }, // failed tries for one address from one place
  'sign-in-address': { points: 100, duration: 15 * MINUTE }, // from everywhere: high, so that nobody can lock others out
  'sign-in-origin': { points: 300, duration: 15 * MINUTE },
  'register-origin': { points: 60, duration: 60 * MINUTE },
  'mail-address': { points: 6, duration: 60 * MINUTE }, // letters asked for one address
  'mail-origin': { points: 120, duration: 60 * MINUTE },
  'code-origin': { points: 120, duration: 60 * MINUTE }, // codes of letters tried
  'upload-person': { points: 6000, duration: 60 * MINUTE },
} as const satisfies Record<string, Allowance>;
export type AllowanceName = keyof typeof ALLOWANCES;

/** Counters in PostgreSQL, so that several servers count together. Addresses stand there as hashes only. */
export class RateLimits {
  private readonly limiters: ReadonlyMap<string, RateLimiterPostgres>;

  constructor(dataSource: DataSource, allowances: Partial<Record<AllowanceName, Allowance>> = {}) {
    const limiter = ([name, allowance]: [string, Allowance]) => {
      const options = { storeClient: dataSource, storeType: 'typeorm', tableName: 'rate_limit', tableCreated: true };
      return [name, new RateLimiterPostgres({ ...options, keyPrefix: name, ...allowance })] as const;
    };
    this.limiters = new Map(Object.entries<Allowance>({ ...ALLOWANCES, ...allowances }).map(limiter));
  }

  /** Counts one try; refuses when there were too many. */
  async spend(name: AllowanceName, subject: string): Promise<void> {
    try {
      await this.limiters.get(name)?.consume(keyOf(subject));
    } catch (error) {
      if (!(error instanceof RateLimiterRes)) throw error;
      const waitSeconds = Math.ceil(error.msBeforeNext / 1000);
      throw new AppError('too-many-tries', text.server.tooManyTries(waitSeconds), { waitSeconds });
    }
  }

  async clear(name: AllowanceName, subject: string): Promise<void> {
    await this.limiters.get(name)?.delete(keyOf(subject));
  }
}

function keyOf(subject: string): string {
  return createHash('sha256').update(subject).digest('hex').slice(0, 32);
}
