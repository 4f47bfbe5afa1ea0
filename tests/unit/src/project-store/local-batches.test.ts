import { expect, it } from 'vitest';
import type { SweepRow } from '../../../../shared/contracts/sweep.js';
import { restoredBatch, undoneBatch } from '../../../../src/lib/project-store/local-batches.js';

const EARLIER = '2026-03-01T09:00:00.000Z';
const NOW = '2026-03-02T09:00:00.000Z';
const sweep = (id: string, batchId: string, sha256: string, deletedAt: string | null = null) =>
  ({ id, batchId, version: 1, createdAt: EARLIER, deletedAt, source: { sha256 } }) as unknown as SweepRow;
const ids = (rows: SweepRow[]) => rows.map(({ id }) => id);

it('takes back the living sweeps of the drop and leaves what was deleted before as it was', () => {
  const rows = [sweep('a', 'one', 'fa'), sweep('b', 'one', 'fb', EARLIER), sweep('c', 'two', 'fc')];
  const changed = undoneBatch(rows, 'one', NOW);
  expect(changed).toMatchObject([{ id: 'a', deletedAt: NOW, version: 2 }]);
});

it('brings back the sweeps of the drop, but not one whose file was added again meanwhile', () => {
  const rows = [sweep('a', 'one', 'fa', NOW), sweep('b', 'one', 'fb', NOW), sweep('again', 'two', 'fb')];
  expect(restoredBatch(rows, 'one')).toMatchObject([{ id: 'a', deletedAt: null, version: 2 }]);
});

it('brings back one sweep of a file only, the one that was added first, and touches no living one', () => {
  const later = { ...sweep('a', 'one', 'fa', NOW), createdAt: NOW };
  const rows = [later, sweep('b', 'one', 'fa', NOW), sweep('c', 'one', 'fc'), sweep('d', 'two', 'fd', NOW)];
  expect(ids(restoredBatch(rows, 'one'))).toEqual(['b']);
});
