import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const NAME = /^hummock-uploads-(\d+)-/;
let made = 0;

/**
 * A folder for files on their way, of this process alone; `remove` takes it away. Folders of processes that ended
 * without doing so are removed here.
 */
export function makeTemporaryFolder(parent = tmpdir()): { path: string; remove: () => void } {
  for (const name of readdirSync(parent)) {
    const pid = Number(NAME.exec(name)?.[1] ?? process.pid);
    if (!isAlive(pid)) rmSync(join(parent, name), { recursive: true, force: true });
  }
  const path = join(parent, `hummock-uploads-${process.pid}-${++made}`);
  rmSync(path, { recursive: true, force: true }); // of an earlier process with the same number
  mkdirSync(path, { mode: 0o700 });
  return { path, remove: () => rmSync(path, { recursive: true, force: true }) };
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM'; // another person's process
  }
}
