import { spawnSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const repeated = (line: string, times: number) => `${line}\n`.repeat(times);

/** One file that breaks each rule of the house, under the rule that has to name it. */
const planted: readonly (readonly [rule: string, file: string, content: string])[] = [
  ['suspicious/noExplicitAny', 'loose.ts', 'export const loose = (value: any) => value;\n'],
  ['style/noDefaultExport', 'nameless.ts', 'export default 1;\n'],
  ['style/useFilenamingConvention', 'camelCase.ts', 'export const camel = 1;\n'],
  ['style/noExcessiveLinesPerFile', 'long.ts', repeated('export {};', 401)],
  [
    'complexity/noExcessiveLinesPerFunction',
    'long-function.ts',
    `export function long() {\n${repeated('  call();', 61)}}\n`,
  ],
  ['nursery/noFloatingPromises', 'floating.ts', 'async function later() {}\nexport function now() {\n  later();\n}\n'],
  ['performance/noBarrelFile', 'barrel.ts', "export { loose } from './loose';\n"],
  ['suspicious/noFocusedTests', 'focused.test.ts', "it.only('runs alone', () => {});\n"],
  ['suspicious/noSkippedTests', 'skipped.test.ts', "it.skip('runs never', () => {});\n"],
];

describe('the lint', () => {
  let folder: string;
  let named: readonly string[];
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'hummock-lint-'));
    cpSync('biome.json', join(folder, 'biome.json'));
    for (const [, file, content] of planted) writeFileSync(join(folder, file), content);
    const args = ['lint', '--vcs-enabled=false', '--reporter=json', '--max-diagnostics=500', '.'];
    const { stdout } = spawnSync(resolve('node_modules/.bin/biome'), args, {
      cwd: folder,
      encoding: 'utf8',
      maxBuffer: 64 << 20,
    });
    const report: { diagnostics: { category: string; severity: string; location: { path: string } }[] } =
      JSON.parse(stdout);
    named = report.diagnostics.map(
      ({ category, severity, location }) => `${severity}: ${category} in ${location.path}`,
    );
  }, 60_000);
  afterAll(() => rmSync(folder, { recursive: true }));

  it.each(planted)('refuses by %s the file %s', (rule, file) => {
    expect(named).toContain(`error: lint/${rule} in ${file}`);
  });
});

const FOLDERS = ['shared', 'calculators', 'server', 'src', 'tests', 'scripts'];

describe('the tree', () => {
  const paths = FOLDERS.flatMap((folder) =>
    readdirSync(folder, { recursive: true, encoding: 'utf8' }).map((path) => join(folder, path)),
  ).filter((path) => !path.startsWith('tests/fixtures'));

  it('has no folder or file for things without a subject', () => {
    expect(paths.length).toBeGreaterThan(100);
    expect(
      paths.filter(
        (path) => /(^|\/)(utils?|helpers?|misc|common)(\.\w+|$)/.test(path) && path !== 'shared/text/common.ts',
      ),
    ).toEqual([]);
  });

  it('gives every column of an entity an explicit type, since decorators carry none at run time', () => {
    const entities = paths.filter((path) => path.endsWith('.entity.ts'));
    expect(entities.length).toBeGreaterThan(5);
    const bare = /@(Column|PrimaryColumn|CreateDateColumn|UpdateDateColumn|DeleteDateColumn)\(\s*\)/;
    expect(entities.filter((path) => bare.test(readFileSync(path, 'utf8')))).toEqual([]);
  });
});
