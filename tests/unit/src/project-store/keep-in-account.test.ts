import { beforeEach, expect, it } from 'vitest';
import type { CreateResult, Result } from '../../../../shared/contracts/result.js';
import type { SweepRevision, SweepRow } from '../../../../shared/contracts/sweep.js';
import { ApiError } from '../../../../src/lib/api-error.js';
import { keepInAccount } from '../../../../src/lib/project-store/keep-in-account.js';
import type { LocalStore } from '../../../../src/lib/project-store/local-store.js';
import type { ProjectStore } from '../../../../src/lib/project-store/project-store.js';

const THERE = '3f0c8f3e-3c1b-4a52-9a55-2f6f0b7d9c21';

/** `told`: the decimal mark that a person chose; the points of a reading follow from it. */
function revision(id: string, number: number, pointsSha256: string, told?: 'comma' | 'point'): SweepRevision {
  const guesses = told ? { decimalMark: { confidence: 1, settled: true, reason: '', toldByPerson: true } } : {};
  return { id, number, pointsSha256, reading: { guesses, decimalMark: told } } as unknown as SweepRevision;
}
const result = (id: string, name: string, revisionId: string, pointsSha256: string) =>
  ({
    ...{ id, name, calculatorId: 'driver-fit', calculatorVersion: 1, settings: {}, settingsVersion: 1, seed: 1 },
    ...{ sheetId: null, itemId: null, output: {} },
    inputs: [{ role: 'sweep', sweepId: 'here', revisionId, pointsSha256, keys: {}, prepSteps: [] }],
  }) as unknown as Result;

function browserWith(revisions: SweepRevision[], results: Result[]) {
  const sweep = { id: 'here', itemId: null, name: 'S', conditions: {}, revision: revisions.at(-1) } as SweepRow;
  const state = { isCleared: false };
  const list = <Row>(rows: Row[]) => ({ list: async () => rows });
  const store = {
    ...{ items: list([]), sweeps: list([sweep]), sheets: list([]), results: list(results) },
    sourceBytes: async () => ({ file: new Blob(['1 2']), fileName: 's.csv' }),
    revisions: async () => [...revisions].reverse(),
    clear: async () => {
      state.isCleared = true;
    },
  };
  return { store: store as unknown as LocalStore, state };
}

/** An account that reads by the same rule as the browser unless `pointsOf` says otherwise; `has`: the file's readings. */
function accountWith(has: SweepRevision[] | undefined, pointsOf = (decimal = 'guessed') => `points-${decimal}`) {
  const revisions = [...(has ?? [])];
  const stored: CreateResult[] = [];
  const row = () => ({ id: THERE, version: revisions.length, revision: revisions.at(-1) }) as SweepRow;
  const read = async (decimal: string | undefined) => {
    const number = revisions.length + 1;
    revisions.push(revision(`there-${number}`, number, pointsOf(decimal)));
    return row();
  };
  const store = {
    projectId: 'project',
    addSweep: async (_: unknown, { reading }: { reading: { decimalMark?: string } }) => {
      if (has) throw new ApiError('already-here', '', 409, '', [], { sweepId: THERE, name: 'S' });
      return read(reading.decimalMark);
    },
    sweeps: { get: async () => row() },
    revisions: async () => [...revisions],
    reread: async (_: SweepRow, { decimalMark }: { decimalMark?: string }) => read(decimalMark),
    results: {
      add: async (given: CreateResult) => {
        const { revisionId, pointsSha256 } = given.inputs[0]!;
        const used = revisions.find(({ id }) => id === revisionId);
        if (used?.pointsSha256 !== pointsSha256) throw new ApiError('validation-failed', 'as the server does', 400);
        stored.push(given);
        return { id: `kept-${stored.length}` };
      },
    },
  };
  return { store: store as unknown as ProjectStore, revisions, stored };
}

beforeEach(() => localStorage.clear());

it('moves every reading of a new file and keeps each result with the reading it was made from', async () => {
  const readings = [revision('r1', 1, 'points-guessed'), revision('r2', 2, 'points-comma', 'comma')];
  const results = [result('a', 'A', 'r1', 'points-guessed'), result('b', 'B', 'r2', 'points-comma')];
  const browser = browserWith(readings, results);
  const account = accountWith(undefined);
  expect((await keepInAccount(browser.store, account.store)).leftOut).toEqual([]);
  expect(account.stored.map(({ inputs }) => inputs[0]?.revisionId)).toEqual(['there-1', 'there-2']);
  expect(browser.state.isCleared).toBe(true);
});

it('takes a reading the project has already for the same when its points are the same, and reads nothing again', async () => {
  const browser = browserWith([revision('r1', 1, 'points-guessed')], [result('a', 'A', 'r1', 'points-guessed')]);
  const account = accountWith([revision('old', 1, 'points-guessed'), revision('new', 2, 'points-point')]);
  expect((await keepInAccount(browser.store, account.store)).leftOut).toEqual([]);
  expect(account.stored[0]?.inputs[0]?.revisionId).toBe('old');
  expect(account.revisions).toHaveLength(2);
});

it('reads a file that the project has under another rule again by the rule of the browser', async () => {
  const browser = browserWith([revision('r1', 1, 'points-comma', 'comma')], [result('a', 'A', 'r1', 'points-comma')]);
  const account = accountWith([revision('old', 1, 'points-point')]);
  expect((await keepInAccount(browser.store, account.store)).leftOut).toEqual([]);
  expect(account.stored[0]?.inputs[0]?.revisionId).toBe('there-2');
});

it('leaves out and names a result whose points the account cannot read, and moves the rest', async () => {
  const readings = [revision('r1', 1, 'points-guessed'), revision('r2', 2, 'points-of-an-older-page', 'comma')];
  const results = [result('a', 'A', 'r1', 'points-guessed'), result('b', 'B', 'r2', 'points-of-an-older-page')];
  const browser = browserWith(readings, results);
  const account = accountWith(undefined);
  const { leftOut } = await keepInAccount(browser.store, account.store);
  expect(leftOut).toEqual([{ name: 'B', calculatorId: 'driver-fit' }]);
  expect(account.stored.map(({ name }) => name)).toEqual(['A']);
  expect(browser.state.isCleared).toBe(true);
});
