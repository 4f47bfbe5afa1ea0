/** The stages of `npm test`: what each runs, and how many of its checks passed and failed. */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { commandPath, installDebianPackages } from './debian.mjs';
import { startThrowAwayCluster } from './postgres.mjs';
import { beganAt, SetupError, sendSignal } from './processes.mjs';
import { startServer } from './server-process.mjs';
import { buildForTests, inTurn, plainEnvironment } from './setup.mjs';

/** @typedef {{ passed: number, failed: number }} Counts */
/**
 * What a stage needs to run.
 * @typedef {object} Context
 * @property {string} root
 * @property {string} reports folder of this run's reports
 * @property {string[]} passedOn arguments for the test runner
 * @property {(line: string) => void} say
 * @property {Set<() => unknown>} open what has to be closed should the run be ended early
 */
/** @typedef {{ name: string, title: string, run: (context: Context) => Promise<Counts> }} Stage */

/** @type {readonly Stage[]} */
export const stages = [
  check('types', 'Types', ['node_modules/typescript/bin/tsc', '-p', '.', '--pretty', 'false']),
  check('lint', 'Lint and format', ['node_modules/@biomejs/biome/bin/biome', 'check', '--error-on-warnings', '.']),
  check('directions', 'Direction of imports', ['scripts/directions.mjs']),
  check('unused', 'Unused files, exports and packages', ['node_modules/knip/bin/knip.js', '--no-progress']),
  unitTests('unit', 'Unit and property tests'),
  unitTests('components', 'Component tests'),
  unitTests('reference', 'Reference data'),
  unitTests('api', 'API and security, on a real PostgreSQL'),
  { name: 'e2e', title: 'Browser tests, in Chromium', run: browserTests },
];

/**
 * A check that holds or does not.
 * @param {string} name
 * @param {string} title
 * @param {string[]} args
 * @returns {Stage}
 */
function check(name, title, args) {
  return {
    name,
    title,
    run: async (context) => ((await run(context, args)) === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 }),
  };
}

/**
 * A project of vitest.config.ts.
 * @param {string} name
 * @param {string} title
 * @returns {Stage}
 */
function unitTests(name, title) {
  return {
    name,
    title,
    run: async (context) => {
      const report = join(context.reports, `${name}.json`);
      const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
      const args = ['node_modules/vitest/vitest.mjs', 'run', '--project', name, ...reporters, ...context.passedOn];
      const status = await run(context, args);
      return counted(status, vitestCounts(report));
    },
  };
}

/** @param {Context} context @returns {Promise<Counts>} */
async function browserTests(context) {
  const { root, reports, passedOn, say } = context;
  const chromium = chromiumPath(say);
  const build = await inTurn(root, say, () => buildForTests(root, say));
  const dataDir = join(reports, 'data');
  mkdirSync(dataDir, { mode: 0o700 });
  const cluster = await startThrowAwayCluster({ say });
  const server = await startServer({
    root,
    main: join(build, 'server', 'main.js'),
    port: 0,
    dataDir,
    env: { DATABASE_URL: cluster.url, HUMMOCK_CLIENT_DIR: join(build, 'client') },
    say: () => {},
  }).catch(async (error) => {
    await cluster.stop();
    throw error;
  });
  const close = async () => {
    context.open.delete(close);
    await server.stop();
    await cluster.stop();
  };
  context.open.add(close);
  try {
    const report = join(reports, 'e2e.json');
    const output = join(reports, 'e2e');
    const args = ['node_modules/@playwright/test/cli.js', 'test', '--reporter=list,json', `--output=${output}`];
    const status = await run(context, [...args, ...passedOn], {
      HUMMOCK_E2E_URL: server.url,
      HUMMOCK_E2E_MAIL: join(dataDir, 'mail'),
      HUMMOCK_CHROMIUM: chromium,
      PLAYWRIGHT_JSON_OUTPUT_FILE: report,
    });
    if (status !== 0) say(`Pictures and traces of what failed: ${output}`);
    return counted(status, playwrightCounts(report));
  } finally {
    await close();
  }
}

/** @param {(line: string) => void} say */
function chromiumPath(say) {
  if (!commandPath('chromium')) installDebianPackages(['chromium'], 'the browser tests', say);
  const path = commandPath('chromium');
  if (path) return path;
  throw new SetupError('Chromium was installed but is not in PATH. Add the folder of the command chromium to PATH.');
}

/**
 * A stage passes only when its runner says so and counted tests, none of them skipped.
 * @param {number} status
 * @param {Counts | undefined} counts
 * @returns {Counts}
 */
function counted(status, counts) {
  const { passed, failed } = counts ?? { passed: 0, failed: 0 };
  return { passed, failed: failed === 0 && (status !== 0 || passed === 0) ? 1 : failed };
}

/** @param {string} path @returns {Counts | undefined} */
function vitestCounts(path) {
  if (!existsSync(path)) return undefined;
  const report = JSON.parse(readFileSync(path, 'utf8'));
  /** @type {{ status: string, assertionResults: unknown[] }[]} */
  const files = report.testResults;
  const unloadable = files.filter((file) => file.status === 'failed' && file.assertionResults.length === 0).length;
  return {
    passed: report.numPassedTests,
    failed: report.numFailedTests + report.numPendingTests + report.numTodoTests + unloadable,
  };
}

/** @param {string} path @returns {Counts | undefined} */
function playwrightCounts(path) {
  if (!existsSync(path)) return undefined;
  const { stats, errors } = JSON.parse(readFileSync(path, 'utf8'));
  return { passed: stats.expected, failed: stats.unexpected + stats.flaky + stats.skipped + errors.length };
}

const LONGEST_STAGE_MS = 20 * 60_000;
const STOPPED_WITHIN_MS = 15_000;
const KEPT_REPORTS = 3;

/**
 * Runs Node on the arguments, shows what it prints, and answers its exit status.
 * @param {Context} context
 * @param {string[]} args
 * @param {Record<string, string>} [more] environment
 * @returns {Promise<number>}
 */
function run({ root, open, say }, args, more = {}) {
  const child = spawn(process.execPath, args, {
    cwd: root,
    env: { ...testEnvironment(), ...more },
    stdio: ['ignore', 'inherit', 'inherit'],
    detached: true, // a group of its own, which is ended as a whole
  });
  /** @type {Promise<number>} */
  const closed = new Promise((resolve) => child.once('close', (code) => resolve(code ?? 1)));
  const end = async () => {
    signalGroup(child, 'SIGINT'); // what every runner takes as the wish to stop in order
    const lastResort = setTimeout(() => signalGroup(child, 'SIGKILL'), STOPPED_WITHIN_MS);
    await closed;
    clearTimeout(lastResort);
  };
  const limit = setTimeout(() => {
    say(`Ended after ${LONGEST_STAGE_MS / 60_000} minutes.`);
    void end();
  }, LONGEST_STAGE_MS);
  open.add(end);
  return closed.finally(() => {
    clearTimeout(limit);
    open.delete(end);
  });
}

/**
 * @param {import('node:child_process').ChildProcess} child
 * @param {NodeJS.Signals} signal
 */
function signalGroup({ pid }, signal) {
  if (pid !== undefined) sendSignal(-pid, signal);
}

/** What the person's shell says about databases, ports and modes must not reach a test. */
function testEnvironment() {
  const own = Object.entries(plainEnvironment()).filter(
    ([name]) => !/^(HUMMOCK_|PG|(DATABASE_URL|FORCE_COLOR)$)/.test(name),
  );
  return { ...Object.fromEntries(own), NO_COLOR: '1' };
}

/**
 * A folder for the reports, pictures and letters of this run; those of the last few runs are kept.
 * @param {string} root
 */
export function reportsFolder(root) {
  const all = join(root, '.cache', 'reports');
  mkdirSync(all, { recursive: true });
  const byAge = readdirSync(all).sort((a, b) => statSync(join(all, b)).mtimeMs - statSync(join(all, a)).mtimeMs);
  const ended = byAge.filter((pid) => beganAt(Number(pid)) === undefined || pid === String(process.pid));
  for (const pid of ended.slice(KEPT_REPORTS)) rmSync(join(all, pid), { recursive: true, force: true });
  const folder = join(all, String(process.pid));
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder);
  return folder;
}
