/** `npm run dev`: the client by Vite's own server, the server bundled again and restarted whenever its sources change. */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, rmSync, watch } from 'node:fs';
import { join } from 'node:path';
import { bindable, SetupError, waitUntil } from './processes.mjs';
import { startServer } from './server-process.mjs';
import { plainEnvironment, serverBundle } from './setup.mjs';

/**
 * @param {{ root: string, port: number, dataDir: string, env: Record<string, string | undefined>, say: (line: string) => void }} given
 * @returns {Promise<import('./server-process.mjs').ServerProcess>} the page's address is Vite's, on `port`; the server stands behind it
 */
export async function startDevelopment({ root, port, dataDir, env, say }) {
  const folder = join(root, '.cache', 'dev');
  const main = join(folder, 'main.js');
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  const bundler = keptChild(root, join(root, 'node_modules/esbuild/bin/esbuild'), [
    ...serverBundle(root, folder),
    '--watch',
  ]);
  if (!(await waitUntil(() => existsSync(main), 30_000))) throw new SetupError('The server could not be bundled.');

  const serverPort = (await bindable(0)) ?? 0;
  const publicUrl = `http://127.0.0.1:${port}`;
  const start = () =>
    startServer({ root, main, port: serverPort, dataDir, env: { ...env, HUMMOCK_PUBLIC_URL: publicUrl }, say });
  let server = await start();
  const vite = keptChild(
    root,
    process.execPath,
    ['node_modules/vite/bin/vite.js', '--port', String(port), '--strictPort'],
    {
      HUMMOCK_API: `http://127.0.0.1:${serverPort}`,
    },
  );
  if (!(await waitUntil(async () => (await bindable(port)) === undefined, 30_000)))
    throw new SetupError('Vite did not start.');

  let change = Promise.resolve();
  /** @type {NodeJS.Timeout | undefined} */
  let pause;
  const watcher = watch(folder, () => {
    clearTimeout(pause);
    pause = setTimeout(() => (change = change.then(restart)), 150);
  });
  const restart = async () => {
    await server.stop();
    try {
      server = await start();
      say('The server restarted.');
    } catch (error) {
      say(error instanceof Error ? error.message : String(error));
    }
  };
  const stop = async () => {
    watcher.close();
    clearTimeout(pause);
    bundler.kill();
    vite.kill();
    await change;
    await server.stop();
  };
  const ended = new Promise((/** @type {(how: string) => void} */ resolve) =>
    vite.once('exit', () => resolve('with Vite')),
  );
  return { pid: server.pid, url: publicUrl, tell: server.tell, ended, stop };
}

/**
 * A child that shows what it says and ends with this process: both esbuild and Vite stop when their input closes.
 * @param {string} root
 * @param {string} program
 * @param {string[]} args
 * @param {Record<string, string>} [env]
 */
function keptChild(root, program, args, env = {}) {
  return spawn(program, args, {
    cwd: root,
    env: { ...plainEnvironment(), ...env },
    stdio: ['pipe', 'inherit', 'inherit'],
  });
}
