/**
 * The direction of imports, checked by dependency-cruiser. It reports success over nothing at all when it cannot parse
 * TypeScript, so every source file has to be among the modules that it looked at.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { join, relative, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

const FOLDERS = ['shared', 'calculators', 'server', 'src', 'tests', 'scripts'];
const project = resolve(fileURLToPath(import.meta.url), '../..');

/** @typedef {{ rule: string, from: string, to: string }} WrongImport */

/**
 * @param {string} root the folder that holds shared/, calculators/, server/, src/
 * @returns {{ modules: number, wrong: WrongImport[], unseen: string[] }} unseen: source files that were not looked at
 */
export function importDirections(root) {
  const folders = FOLDERS.filter((folder) => existsSync(join(root, folder)));
  const program = join(project, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs');
  const config = join(project, '.dependency-cruiser.cjs');
  const run = spawnSync(process.execPath, [program, '--config', config, '--output-type', 'json', ...folders], {
    cwd: root,
    encoding: 'utf8',
    maxBuffer: 256 << 20,
  });
  if (!run.stdout.startsWith('{')) throw new Error(`dependency-cruiser gave no report: ${run.stderr}`);
  /** @type {{ modules: { source: string }[], summary: { violations: { rule: { name: string }, from: string, to: string }[] } }} */
  const report = JSON.parse(run.stdout);
  const seen = new Set(report.modules.map((module) => module.source));
  return {
    modules: seen.size,
    wrong: report.summary.violations.map(({ rule, from, to }) => ({ rule: rule.name, from, to })),
    unseen: folders.flatMap((folder) => sourcesIn(root, folder)).filter((path) => !seen.has(path)),
  };
}

/**
 * @param {string} root
 * @param {string} folder
 */
function sourcesIn(root, folder) {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|mjs)$/.test(entry.name))
    .map((entry) => relative(root, join(entry.parentPath, entry.name)))
    .filter((path) => !path.startsWith('tests/fixtures/'));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const { modules, wrong, unseen } = importDirections(project);
  for (const { rule, from, to } of wrong) console.error(`${rule}: ${from} imports ${to}`);
  for (const path of unseen) console.error(`not looked at: ${path}`);
  console.log(`Direction of imports: ${modules} modules, ${wrong.length} wrong imports.`);
  process.exitCode = wrong.length + unseen.length > 0 ? 1 : 0;
}
