/**
 * `npm test`: the set-up of a fresh clone, then every check and every test. A stage that fails does not keep the others
 * from running. `npm test -- unit api` runs some stages; other words go to their runner: `npm test -- e2e -g "two files"`.
 */
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { inWords, SetupError } from './processes.mjs';
import { endSetupChildren, installPackages, inTurn, requireNode, requireOwnFolder } from './setup.mjs';
import { reportsFolder, stages } from './test-stages.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));
const names = stages.map((stage) => stage.name);
const words = process.argv.slice(2);
const chosen = words.filter((word) => names.includes(word));
const passedOn = words.filter((word) => !names.includes(word));

/** @param {string} line */
const say = (line) => console.log(line);

/** @type {Set<() => unknown>} */
const open = new Set();
let isEnding = false;
for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, async () => {
    if (isEnding) return;
    isEnding = true;
    say('Stopping.');
    endSetupChildren();
    for (const close of [...open].reverse()) await close(); // the runner before the server and database that it uses
    process.exit(130);
  });
}

async function main() {
  if (passedOn.length > 0 && chosen.length !== 1) {
    throw new SetupError(
      `"${passedOn.join(' ')}" is no stage. The stages are ${names.join(', ')}; with one stage named, other words go to its runner.`,
    );
  }
  requireNode();
  requireOwnFolder(root);
  await inTurn(root, say, () => installPackages(root, say));
  const context = { root, reports: reportsFolder(root), passedOn, say, open };
  const results = [];
  for (const stage of stages) {
    if (isEnding || (chosen.length > 0 && !chosen.includes(stage.name))) continue;
    say(`\n── ${stage.title} ${'─'.repeat(Math.max(0, 72 - stage.title.length))}`);
    const begin = performance.now();
    const counts = await stage.run(context).catch((error) => {
      say(inWords(error));
      return { passed: 0, failed: 1 };
    });
    results.push({ title: stage.title, seconds: (performance.now() - begin) / 1000, ...counts });
  }
  report(results);
}

/** @param {{ title: string, seconds: number, passed: number, failed: number }[]} results */
function report(results) {
  say(`\n── Summary ${'─'.repeat(65)}`);
  for (const { title, seconds, passed, failed } of results) {
    const verdict = failed > 0 ? `${failed} failed` : 'passed';
    say(`${title.padEnd(42)}${`${seconds.toFixed(1)} s`.padStart(9)}${String(passed).padStart(7)}  ${verdict}`);
  }
  const passed = results.reduce((sum, result) => sum + result.passed, 0);
  const failed = results.reduce((sum, result) => sum + result.failed, 0);
  say(`\n${passed} passed, ${failed} failed`);
  process.exitCode = failed > 0 || passed === 0 ? 1 : 0;
}

await main().catch((error) => {
  console.error(inWords(error));
  say('\n0 passed, 1 failed');
  process.exitCode = 1;
});
