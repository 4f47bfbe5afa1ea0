import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { edited } from './local-rows.js';

const inOrder = (a: SweepRow, b: SweepRow) => a.createdAt.localeCompare(b.createdAt) || a.id.localeCompare(b.id);

/** The rows that change when a drop of files is taken back: its living sweeps, into the bin. As on the server. */
export function undoneBatch(rows: readonly SweepRow[], batchId: string, deletedAt: string): SweepRow[] {
  const living = rows.filter((row) => row.batchId === batchId && row.deletedAt === null);
  return living.map((row) => edited(row, { deletedAt }));
}

/** The reverse: its sweeps come out of the bin, but for those whose file was added again meanwhile. As on the server. */
export function restoredBatch(rows: readonly SweepRow[], batchId: string): SweepRow[] {
  const here = new Set(rows.filter(({ deletedAt }) => deletedAt === null).map(({ source }) => source.sha256));
  const restored: SweepRow[] = [];
  for (const row of rows.filter((one) => one.batchId === batchId && one.deletedAt !== null).sort(inOrder)) {
    if (here.has(row.source.sha256)) continue;
    here.add(row.source.sha256);
    restored.push(edited(row, { deletedAt: null }));
  }
  return restored;
}
