/** `npm run bench [names]`: runs every `*.bench.ts` of this folder, prints what it measured, ends with 1 when a bar is missed. */
import { readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { type Bench, isReached, type Measured } from './bench.js';

const folder = new URL('./', import.meta.url);

function barOf({ atLeast, atMost }: Measured): string {
  if (atLeast !== undefined) return `at least ${atLeast}`;
  return atMost === undefined ? '' : `at most ${atMost}`;
}

function lineOf(measured: Measured): string {
  const value = `${measured.value.toPrecision(4)} ${measured.unit}`.padStart(16);
  const bar = barOf(measured).padEnd(16);
  const verdict = bar.trim() === '' ? '      ' : isReached(measured) ? 'ok    ' : 'MISSED';
  return `  ${measured.name.padEnd(44)}${value}  ${bar}${verdict}  ${measured.note ?? ''}`.trimEnd();
}

async function main(wanted: readonly string[]): Promise<number> {
  const names = readdirSync(fileURLToPath(folder))
    .filter((name) => name.endsWith('.bench.ts'))
    .map((name) => name.slice(0, -'.bench.ts'.length))
    .sort();
  const unknown = wanted.filter((name) => !names.includes(name));
  if (unknown.length > 0) {
    console.error(`There is no bench called ${unknown.join(', ')}; there are ${names.join(', ')}.`);
    return 2;
  }
  let missed = 0;
  for (const name of wanted.length > 0 ? wanted : names) {
    const { bench } = (await import(new URL(`${name}.bench.ts`, folder).href)) as { bench: Bench };
    console.log(`\n${bench.title}`);
    try {
      for (const measured of await bench.run()) {
        console.log(lineOf(measured));
        if (!isReached(measured)) missed++;
      }
    } catch (error) {
      console.error(`  ${error instanceof Error ? error.message : String(error)}`);
      missed++;
    }
  }
  console.log(missed === 0 ? '\nEvery bar is reached.' : `\n${missed} missed.`);
  return missed === 0 ? 0 : 1;
}

process.exitCode = await main(process.argv.slice(2));
