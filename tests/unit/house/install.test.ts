import { chmodSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { installPackages } from '../../../scripts/setup.mjs';

const quiet = () => undefined;

describe('installing the packages of the lock', () => {
  let root: string;
  const lock = (version: string) => {
    const packages = {
      '': { version: '1.0.0' },
      'node_modules/zod': { version },
      'node_modules/@esbuild/elsewhere': { version, optional: true }, // for another system: never installed here
    };
    writeFileSync(join(root, 'package-lock.json'), JSON.stringify({ packages }));
  };
  /** What npm leaves behind when it has finished. */
  const putInPlace = (version: string) => {
    mkdirSync(join(root, 'node_modules'), { recursive: true });
    const packages = { 'node_modules/zod': { version } };
    writeFileSync(join(root, 'node_modules/.package-lock.json'), JSON.stringify({ packages }));
  };
  /** An npm of our own, first in PATH, that notes how it was called. */
  const npm = (ending: string) => {
    writeFileSync(
      join(root, 'bin/npm'),
      `#!/bin/sh\necho "$1 NODE_ENV=$NODE_ENV" >> '${root}/calls'\nmkdir -p node_modules\n${ending}\n`,
    );
    chmodSync(join(root, 'bin/npm'), 0o755);
  };
  const calls = () =>
    existsSync(join(root, 'calls')) ? readFileSync(join(root, 'calls'), 'utf8').trim().split('\n') : [];

  beforeEach(() => {
    root = mkdtempSync(join(tmpdir(), 'hummock-install-'));
    mkdirSync(join(root, 'bin'));
    npm('exit 0');
    lock('4.0.0');
    vi.stubEnv('PATH', `${join(root, 'bin')}:${process.env.PATH}`);
    vi.stubEnv('NODE_ENV', 'production');
  });
  afterEach(() => {
    vi.unstubAllEnvs();
    rmSync(root, { recursive: true });
  });

  it('runs npm ci once, without the NODE_ENV that would leave packages out', async () => {
    await installPackages(root, quiet);
    await installPackages(root, quiet);
    expect(calls()).toEqual(['ci NODE_ENV=']);
  });

  it('leaves alone what npm itself has put in place, packages for other systems apart', async () => {
    putInPlace('4.0.0');
    await installPackages(root, quiet);
    expect(calls()).toEqual([]);
  });

  it('runs again when the lock has changed, unless npm has already followed it', async () => {
    putInPlace('4.0.0');
    await installPackages(root, quiet);
    lock('4.1.0');
    putInPlace('4.1.0');
    await installPackages(root, quiet);
    expect(calls()).toEqual([]);
    lock('4.2.0');
    await installPackages(root, quiet);
    expect(calls()).toHaveLength(1);
  });

  it('runs again after an installation that was interrupted', async () => {
    mkdirSync(join(root, 'node_modules/zod'), { recursive: true }); // no list: npm writes it last
    await installPackages(root, quiet);
    expect(calls()).toHaveLength(1);
  });

  it('runs again under another Node.js, whose native packages differ', async () => {
    putInPlace('4.0.0');
    await installPackages(root, quiet);
    const stampPath = join(root, 'node_modules/.hummock-stamp');
    writeFileSync(stampPath, readFileSync(stampPath, 'utf8').replace(/^\d+/, '1'));
    await installPackages(root, quiet);
    expect(calls()).toHaveLength(1);
  });

  it('passes on what npm said when it fails, and tries again the next time', async () => {
    npm('echo "the registry is not reachable" >&2; exit 1');
    await expect(installPackages(root, quiet)).rejects.toThrow(
      /npm ci did not succeed[\s\S]*the registry is not reachable/,
    );
    npm('exit 0');
    await installPackages(root, quiet);
    expect(calls()).toHaveLength(2);
  });
});
