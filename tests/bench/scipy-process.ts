import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { createInterface, type Interface } from 'node:readline';
import { fileURLToPath } from 'node:url';

const PYTHON = '/usr/bin/python3';

/**
 * What SciPy deserves: one thread for its small matrices (more cost it time), and an allocator that keeps large arrays
 * instead of handing them back to the system after every step.
 */
const ENVIRONMENT = {
  OPENBLAS_NUM_THREADS: '1',
  OMP_NUM_THREADS: '1',
  MALLOC_MMAP_THRESHOLD_: '1073741824',
  MALLOC_TRIM_THRESHOLD_: '4294967296',
};

/** A running script of this folder that answers every line of JSON with one. */
export class ScipyProcess {
  private readonly child: ChildProcess;
  private readonly lines: AsyncIterator<string>;
  private readonly reader: Interface;

  constructor(script: string) {
    if (spawnSync(PYTHON, ['-c', 'import scipy, numpy']).status !== 0)
      throw new Error(
        'SciPy is missing: this bench compares with it. Install it with  apt-get install -y python3-scipy',
      );
    const path = fileURLToPath(new URL(script, import.meta.url));
    this.child = spawn(PYTHON, [path], { env: { ...process.env, ...ENVIRONMENT }, stdio: ['pipe', 'pipe', 'inherit'] });
    this.reader = createInterface({ input: this.child.stdout! });
    this.lines = this.reader[Symbol.asyncIterator]();
  }

  async next<Answer>(): Promise<Answer> {
    const { value, done } = await this.lines.next();
    if (done) throw new Error('The SciPy side ended early; its message stands above.');
    return JSON.parse(value) as Answer;
  }

  ask<Answer>(request: unknown): Promise<Answer> {
    this.child.stdin!.write(`${JSON.stringify(request)}\n`);
    return this.next<Answer>();
  }

  close(): void {
    this.child.stdin!.end();
    this.reader.close();
  }
}
