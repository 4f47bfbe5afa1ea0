import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { createInterface } from 'node:readline';
import { afterAll, describe, expect, it, vi } from 'vitest';

vi.setConfig({ testTimeout: 120_000 }); // every test starts processes

/** The real process, as `npm run calculate` starts it. Expected values: the truth files beside the simulated sweeps. */
const folder = mkdtempSync(join(tmpdir(), 'hummock cli ')); // a path with a blank
afterAll(() => rmSync(folder, { recursive: true }));
const dialects = resolve('tests/fixtures/text-dialects');
const freeAir = resolve('tests/fixtures/driver-free-air/fa-d01-drv-165-a.csv');

interface Ended {
  readonly status: number | null;
  readonly out: string;
  readonly err: string;
}
function started(
  command: string,
  args: readonly string[],
  options: { cwd?: string; input?: string } = {},
): Promise<Ended> {
  return new Promise((done, fail) => {
    const child = spawn(command, args, { cwd: options.cwd ?? process.cwd(), stdio: ['pipe', 'pipe', 'pipe'] });
    let out = '';
    let err = '';
    child.stdout.on('data', (chunk: Buffer) => (out += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (err += chunk.toString()));
    child.on('error', fail);
    child.on('close', (status) => done({ status, out, err }));
    child.stdin.end(options.input ?? '');
  });
}
const tsx = resolve('node_modules/tsx/dist/cli.mjs');
const cli = resolve('calculators/cli.ts');
const calculate = (args: readonly string[], options = {}) => started(process.execPath, [tsx, cli, ...args], options);
const parsed = (text: string) => JSON.parse(text);
const lines = (text: string) => text.trimEnd().split('\n').map(parsed);
const writeJobs = (name: string, jobs: readonly unknown[]) => {
  const path = join(folder, name);
  writeFileSync(path, jobs.map((job) => (typeof job === 'string' ? job : JSON.stringify(job))).join('\n'));
  return path;
};

describe('calculate list', () => {
  it('names every calculator with roles, settings and figures', async () => {
    const { status, out } = await calculate(['list']);
    expect(status).toBe(0);
    const entries: { id: string; roles: object; settings: { properties: object }; figures: unknown[] }[] = parsed(out);
    expect(entries.map(({ id }) => id)).toEqual(expect.arrayContaining(['read', 'driver-fit']));
    const fit = entries.find(({ id }) => id === 'driver-fit');
    expect(Object.keys(fit?.roles ?? {})).toEqual(['free-air', 'added-mass', 'known-volume']);
    expect(Object.keys(fit?.settings.properties ?? {})).toContain('coil');
    expect(fit?.figures.length).toBeGreaterThan(30);
  });
});

describe('calculate read', () => {
  it('prints the sweep with its reading and findings', async () => {
    const { status, out, err } = await calculate(['read', join(dialects, 'unsorted.csv')]);
    expect([status, err]).toEqual([0, '']);
    const answer = parsed(out);
    const { f } = parsed(readFileSync(join(dialects, 'truth.json'), 'utf8')).files[0];
    expect(answer.frequency).toEqual(f);
    expect(answer.real).toHaveLength(60);
    expect(answer.imaginary).toHaveLength(60);
    expect(answer).toMatchObject({ calculator: 'read', version: 1, figures: [], reading: { separator: 'comma' } });
    expect(answer.findings.map(({ code }: { code: string }) => code)).toEqual(['unsorted']);
  });
  it('takes corrections, and resamples to the frequencies asked for', async () => {
    const file = join(dialects, 'magnitude-only.txt');
    const { out } = await calculate([
      'read',
      file,
      '--reading',
      '{"frequencyUnit":"kHz"}',
      '--set',
      'frequencies=[20000,10000]',
    ]);
    const answer = parsed(out);
    expect(answer.frequency).toEqual([10000, 20000]);
    expect(answer.magnitude[0]).toBe(7.41184); // the first row of the file, untouched
    expect(answer.reading.guesses.frequencyUnit.toldByPerson).toBe(true);
  });
  it('answers a bad file, a missing file and a bad setting with a typed error and status 1', async () => {
    const all = await Promise.all([
      calculate(['read', join(dialects, 'bad/one-column.txt')]),
      calculate(['read', join(folder, 'nowhere.csv')]),
      calculate(['read', freeAir, '--reading', '{"separator":"semicolon"}']),
    ]);
    expect(all.map(({ status }) => status)).toEqual([1, 1, 1]);
    expect(all.map(({ err }) => err)).toEqual(['', '', '']);
    const errors = all.map(({ out }) => parsed(out).error);
    expect(errors.map(({ code }) => code)).toEqual(['too-few-columns', 'missing-input', 'bad-setting']);
    expect(errors.map(({ where }) => where)).toEqual([
      'one-column.txt',
      join(folder, 'nowhere.csv'),
      'reading.separator',
    ]);
  });
});

describe('calculate CALCULATOR', () => {
  it('fits a driver and prints figures in SI, with curves when asked', async () => {
    const { status, out } = await calculate([
      'driver-fit',
      '--in',
      `free-air=${freeAir}`,
      '--set',
      'coil=inductor',
      '--traces',
    ]);
    expect(status).toBe(0);
    const answer = parsed(out);
    expect(answer).toMatchObject({ calculator: 'driver-fit', findings: expect.any(Array), tables: expect.any(Array) });
    const fs = answer.figures.find(({ id }: { id: string }) => id === 'fs');
    expect(Math.abs(fs.value - 51.3909822)).toBeLessThan(0.000514037201); // fs of fa-d01 and its tolerance, truth.json
    expect(answer.traces.length).toBeGreaterThan(0);
    expect(Array.isArray(answer.traces[0].x)).toBe(true);
  });
  it('leaves out the curves otherwise, and takes settings from a file, the command line last', async () => {
    const settings = join(folder, 'settings.json');
    writeFileSync(settings, '{"coil":"no such model","pistonDiameter":0.1354}');
    const args = ['driver-fit', '--in', `free-air=${freeAir}`, '--settings', settings];
    const [wrong, right] = await Promise.all([calculate(args), calculate([...args, '--set', 'coil=inductor'])]);
    expect(wrong.status).toBe(1);
    expect(parsed(wrong.out).error).toMatchObject({ code: 'bad-setting', where: 'coil' });
    expect(right.status).toBe(0);
    expect(parsed(right.out)).not.toHaveProperty('traces');
  });
  it('takes keys of a role behind a question mark', async () => {
    const mass = resolve('tests/fixtures/vas-added-mass/vm-d01-drv-165-e-mass1.csv');
    const free = resolve('tests/fixtures/vas-added-mass/vm-d01-drv-165-e-free.csv');
    const given = [
      'driver-fit',
      '--in',
      `free-air=${free}`,
      '--set',
      'coil=inductor+eddy',
      '--set',
      'pistonDiameter=0.126257511',
    ];
    const [without, withKey] = await Promise.all([
      calculate([...given, '--in', `added-mass=${mass}`]),
      calculate([...given, '--in', `added-mass=${mass}?mass=0.009977`]),
    ]);
    expect(parsed(without.out).error).toMatchObject({ code: 'missing-input', where: 'added-mass.mass' });
    expect(withKey.status).toBe(0);
    expect(parsed(withKey.out).figures.map(({ id }: { id: string }) => id)).toContain('Mms');
  });
});

describe('wrong usage', () => {
  it.each([[[]], [['nonsense']], [['read']], [['driver-fit', 'a.csv']], [['jobs', '/no/such/file.ndjson']]])(
    '%j: one line on standard error, nothing on standard output, status 2',
    async (args) => {
      const { status, out, err } = await calculate(args);
      expect(status).toBe(2);
      expect(out).toBe('');
      expect(err.trimEnd().split('\n')).toHaveLength(1);
      expect(err).not.toMatch(/ at .*:\d+:\d+/); // no stack
    },
  );
});

describe('calculate jobs', () => {
  it('answers one line a job in order, with an error line among them, and ends with 0', async () => {
    const sweep = (file: string) => [{ role: 'sweep', file }];
    const path = writeJobs('mixed.ndjson', [
      {
        id: 'first',
        calculator: 'driver-fit',
        inputs: [{ role: 'free-air', file: freeAir }],
        settings: { coil: 'inductor' },
      },
      { id: 2, calculator: 'read', inputs: sweep(join(dialects, 'bad/empty.txt')) },
      'this is no job',
      '',
      {
        id: { any: 'json' },
        calculator: 'read',
        inputs: sweep(join(dialects, 'tab-plain.txt')),
        settings: { frequencies: [100] },
      },
      { id: 5, calculator: 'no-such' },
      { id: 6, calculator: 'driver-fit', inputs: [{ role: 'free-air', file: freeAir, mass: 0.01 }] },
      { id: 7, kalkulator: 'read' },
    ]);
    const { status, out, err } = await calculate(['jobs', path]);
    expect([status, err]).toEqual([0, '']);
    const answers = lines(out);
    expect(answers.map(({ id }) => id)).toEqual(['first', 2, undefined, { any: 'json' }, 5, 6, 7]);
    expect(answers[0].figures.length).toBeGreaterThan(10);
    expect(answers.map(({ error }) => error?.code)).toEqual([
      undefined,
      'empty-file',
      'bad-setting',
      undefined,
      'bad-setting',
      'bad-setting',
      'bad-setting',
    ]);
    expect(answers[2].error.where).toBe('line 3');
    expect(answers[3].frequency).toEqual([100]);
    expect(answers[5].error.where).toBe('free-air.mass');
  });
  it('keeps the order of many jobs', async () => {
    const files = ['tab-plain.txt', 'comma-header.csv', 'bad/all-nan.csv', 'thousands.txt'];
    const jobs = Array.from({ length: 400 }, (_, id) => ({
      id,
      calculator: 'read',
      inputs: [{ role: 'sweep', file: join(dialects, files[id % 4] as string) }],
      settings: { frequencies: [1000] },
    }));
    const { status, out } = await calculate(['jobs', writeJobs('many.ndjson', jobs)]);
    expect(status).toBe(0);
    const answers = lines(out);
    expect(answers.map(({ id }) => id)).toEqual(jobs.map(({ id }) => id));
    expect(answers.filter(({ error }) => error?.code === 'no-numeric-data')).toHaveLength(100);
  });
  it('answers each job as soon as it can, before the next is known', async () => {
    const child = spawn(process.execPath, [tsx, cli, 'jobs', '-'], { stdio: ['pipe', 'pipe', 'inherit'] });
    const ended = new Promise((done) => child.on('close', done));
    const answers = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
    for (const id of [1, 2, 3]) {
      const inputs = [{ role: 'sweep', file: join(dialects, 'tab-plain.txt') }];
      child.stdin.write(`${JSON.stringify({ id, calculator: 'read', inputs, settings: { frequencies: [20] } })}\n`);
      expect(parsed((await answers.next()).value)).toMatchObject({ id, frequency: [20] });
    }
    child.stdin.end();
    expect(await ended).toBe(0);
  });
  it('fits every driver of the simulated set, one line each, all finite', async () => {
    const truth = parsed(readFileSync('tests/fixtures/driver-free-air/truth.json', 'utf8'));
    const cases: { id: string; files: { name: string }[] }[] = truth.cases;
    const jobs = cases.map(({ id, files }) => ({
      id,
      calculator: 'driver-fit',
      inputs: [{ role: 'free-air', file: resolve('tests/fixtures/driver-free-air', files[0]?.name ?? '') }],
    }));
    const { status, out } = await calculate(['jobs', writeJobs('drivers.ndjson', jobs)]);
    expect(status).toBe(0);
    const answers = lines(out);
    expect(answers.map(({ id }) => id)).toEqual(cases.map(({ id }) => id));
    for (const { figures } of answers) {
      const fs = figures.find(({ id }: { id: string }) => id === 'fs');
      expect(Number.isFinite(fs.value)).toBe(true);
    }
  });
  it('takes jobs from standard input and finds files beside the file of jobs', async () => {
    writeFileSync(join(folder, 'beside.txt'), readFileSync(join(dialects, 'tab-plain.txt')));
    const job = {
      calculator: 'read',
      inputs: [{ role: 'sweep', file: 'beside.txt' }],
      settings: { frequencies: [50] },
    };
    const [beside, piped] = await Promise.all([
      calculate(['jobs', writeJobs('beside.ndjson', [job])]),
      calculate(['jobs', '-'], { cwd: folder, input: `${JSON.stringify(job)}\n` }),
    ]);
    expect(lines(beside.out)[0].frequency).toEqual([50]);
    expect(lines(piped.out)[0].frequency).toEqual([50]);
  });
});

describe('npm run calculate', () => {
  it('passes exit statuses on and finds files from the folder in which it was typed', async () => {
    writeFileSync(join(folder, 'here.txt'), readFileSync(join(dialects, 'tab-plain.txt')));
    const npm = (...args: string[]) =>
      started('npm', ['--prefix', process.cwd(), 'run', '--silent', 'calculate', '--', ...args], { cwd: folder });
    const [read, bad, wrong] = await Promise.all([npm('read', 'here.txt'), npm('read', 'gone.txt'), npm('nonsense')]);
    expect([read.status, bad.status, wrong.status]).toEqual([0, 1, 2]);
    expect(parsed(read.out).frequency).toHaveLength(60);
  });
});
