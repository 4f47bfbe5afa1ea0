import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';

/** A built client as small as can be, in a folder that goes with the test file. */
export function makeClientFiles(): string {
  const folder = mkdtempSync(join(tmpdir(), 'hummock-client-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  mkdirSync(join(folder, 'assets'));
  const nonce = '<meta property="csp-nonce" nonce="__CSP_NONCE__">';
  writeFileSync(join(folder, 'index.html'), `<!doctype html><html><head>${nonce}</head><body>Hummock</body></html>`);
  writeFileSync(join(folder, 'assets', 'main-4f2a.js'), `export const long = '${'Re fs Qts Vas '.repeat(400)}';`);
  writeFileSync(join(folder, 'icon.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
  writeFileSync(join(folder, '.secret'), 'not for others');
  return folder;
}
