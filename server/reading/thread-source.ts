import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

export interface ThreadSource {
  readonly entry: string | URL;
  readonly isText: boolean; // the program itself, not where it lies
}
let fromSources: Promise<ThreadSource> | undefined;

/**
 * The program of the reading thread. In a build it lies beside the server's bundle as `reading-thread.js`; when the
 * server runs from its sources (tests, development) it is bundled once a process, because a thread has no loader for
 * TypeScript.
 */
export function readingThreadSource(): Promise<ThreadSource> {
  const built = new URL('./reading-thread.js', import.meta.url);
  if (existsSync(built)) return Promise.resolve({ entry: built, isText: false });
  fromSources ??= bundleFromSources(fileURLToPath(new URL('./reading-thread.ts', import.meta.url)));
  return fromSources;
}

async function bundleFromSources(file: string): Promise<ThreadSource> {
  const { build } = await import('esbuild');
  const { outputFiles } = await build({
    entryPoints: [file],
    bundle: true,
    platform: 'node',
    format: 'cjs',
    write: false,
    logLevel: 'silent',
  });
  return { entry: outputFiles[0]?.text ?? '', isText: true };
}
