import { mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { ConfigError, readConfig } from '../../../server/config.js';

const folder = mkdtempSync(join(tmpdir(), 'hummock-config-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));
const least = { DATABASE_URL: 'postgres://u:p@127.0.0.1:5432/d', HUMMOCK_DATA_DIR: folder };

it('needs only the database, and listens on loopback unless told otherwise', () => {
  const config = readConfig(least);
  expect(config).toMatchObject({
    host: '127.0.0.1',
    port: 4680,
    publicUrl: undefined,
    smtpUrl: undefined,
    trustProxy: false,
  });
});

it('makes a secret once, for this user alone, and finds it again', () => {
  const { secret } = readConfig(least);
  const path = join(folder, 'secret');
  expect(secret).toMatch(/^[\w-]{64}$/);
  expect(readFileSync(path, 'utf8')).toBe(secret);
  expect(statSync(path).mode & 0o077).toBe(0);
  expect(readConfig(least).secret).toBe(secret);
  expect(readConfig({ ...least, HUMMOCK_SECRET: 'x'.repeat(40) }).secret).toBe('x'.repeat(40));
});

it('takes an empty variable for one that is not set', () => {
  expect(readConfig({ ...least, SMTP_URL: '', HUMMOCK_PORT: '' })).toMatchObject({ smtpUrl: undefined, port: 4680 });
});

it('keeps of the public address what pages are compared with: the origin', () => {
  expect(readConfig({ ...least, HUMMOCK_PUBLIC_URL: 'https://bench.example/some/path/' }).publicUrl).toBe(
    'https://bench.example',
  );
});

it('reads which proxies to believe as a number of them or as their addresses', () => {
  expect(readConfig({ ...least, HUMMOCK_TRUST_PROXY: '1' }).trustProxy).toBe(1);
  expect(readConfig({ ...least, HUMMOCK_TRUST_PROXY: 'loopback' }).trustProxy).toBe('loopback');
});

it.each([
  ['no database', { DATABASE_URL: undefined }, 'DATABASE_URL: This is needed.'],
  ['a database of another kind', { DATABASE_URL: 'mysql://x' }, 'DATABASE_URL: This has to be a postgres:// address.'],
  ['a port beyond the last', { HUMMOCK_PORT: '70000' }, 'HUMMOCK_PORT: This has to be 65535 or less.'],
  ['a port in words', { HUMMOCK_PORT: 'many' }, 'HUMMOCK_PORT: '],
  ['a secret that is too short', { HUMMOCK_SECRET: 'short' }, 'HUMMOCK_SECRET: Use at least 32 characters.'],
  ['an address that is none', { HUMMOCK_PUBLIC_URL: 'bench' }, 'HUMMOCK_PUBLIC_URL: '],
])('refuses %s and names the variable', (_, more, line) => {
  const read = () => readConfig({ ...least, ...more });
  expect(read).toThrow(ConfigError);
  expect(read).toThrow(line);
});
