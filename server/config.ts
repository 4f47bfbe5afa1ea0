import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { z } from 'zod';
import { schemaWords } from '../shared/schema-words.js';

const port = z.coerce.number().int().min(0).max(65_535);

const EnvironmentSchema = z.object({
  DATABASE_URL: z.string().regex(/^postgres(ql)?:\/\//, 'This has to be a postgres:// address.'),
  HUMMOCK_PORT: port.default(4680),
  HUMMOCK_HOST: z.string().min(1).default('127.0.0.1'),
  HUMMOCK_DATA_DIR: z.string().min(1).default('.data'),
  HUMMOCK_CLIENT_DIR: z.string().min(1).default('dist/client'),
  HUMMOCK_PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(), // as people type it; behind a proxy it has to be given
  HUMMOCK_TRUST_PROXY: z.string().min(1).optional(), // which proxies may say who asks: "loopback", "10.0.0.0/8", "1"
  HUMMOCK_SECRET: z.string().min(32).optional(), // the same on all servers of one database
  HUMMOCK_DEMO: z.enum(['yes', 'no']).optional(), // none: only where nobody but this machine can reach it
  HUMMOCK_LOG_LEVEL: z.enum(['silent', 'fatal', 'error', 'warn', 'info', 'debug']).default('info'),
  HUMMOCK_MAIL_FROM: z.string().min(3).default('Hummock <hummock@localhost>'),
  SMTP_URL: z
    .string()
    .regex(/^smtps?:\/\//, 'This has to be an smtp:// or smtps:// address.')
    .optional(), // none: letters stay in the data folder
});

export interface Config {
  readonly databaseUrl: string;
  readonly port: number; // 0: any free one
  readonly host: string;
  readonly dataDir: string;
  readonly clientDir: string;
  readonly publicUrl: string | undefined;
  readonly trustProxy: string | number | false;
  readonly secret: string;
  readonly hasDemo: boolean; // the invented school, with a password that is printed
  readonly logLevel: string;
  readonly mailFrom: string;
  readonly smtpUrl: string | undefined;
}

/** A setting that cannot be used, in one sentence a line: shown as it is, without a stack. */
export class ConfigError extends Error {
  override readonly name = 'ConfigError';
}

/** Read once, at the start; everything else is handed what it needs. */
export function readConfig(environment: Readonly<Record<string, string | undefined>>): Config {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const parsed = EnvironmentSchema.safeParse(given, { error: schemaWords });
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new ConfigError(`The environment holds settings that cannot be used.\n${lines.join('\n')}`);
  }
  const values = parsed.data;
  const dataDir = resolve(values.HUMMOCK_DATA_DIR);
  const hops = values.HUMMOCK_TRUST_PROXY;
  return {
    databaseUrl: values.DATABASE_URL,
    port: values.HUMMOCK_PORT,
    host: values.HUMMOCK_HOST,
    dataDir,
    clientDir: resolve(values.HUMMOCK_CLIENT_DIR),
    publicUrl: values.HUMMOCK_PUBLIC_URL && new URL(values.HUMMOCK_PUBLIC_URL).origin,
    trustProxy: hops === undefined ? false : /^\d+$/.test(hops) ? Number(hops) : hops,
    secret: values.HUMMOCK_SECRET ?? keptSecret(dataDir),
    hasDemo: values.HUMMOCK_DEMO === undefined ? isForThisMachine(values) : values.HUMMOCK_DEMO === 'yes',
    logLevel: values.HUMMOCK_LOG_LEVEL,
    mailFrom: values.HUMMOCK_MAIL_FROM,
    smtpUrl: values.SMTP_URL,
  };
}

function isForThisMachine(values: z.infer<typeof EnvironmentSchema>): boolean {
  const { hostname } = new URL(values.HUMMOCK_PUBLIC_URL ?? `http://${values.HUMMOCK_HOST.replace(/^.*:.*$/, '[$&]')}`);
  return ['localhost', '127.0.0.1', '[::1]'].includes(hostname);
}

/** A secret of this installation, made on the first start; whoever deletes it signs everybody out. */
function keptSecret(dataDir: string): string {
  const path = join(dataDir, 'secret');
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  if (!existsSync(path)) {
    try {
      writeFileSync(path, randomBytes(48).toString('base64url'), { mode: 0o600, flag: 'wx' });
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error; // two first starts: the other one's stays
    }
  }
  return readFileSync(path, 'utf8').trim();
}
