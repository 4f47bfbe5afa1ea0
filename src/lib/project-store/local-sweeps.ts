import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { CreateSweep, SweepRevision, SweepRow } from '../../../shared/contracts/sweep.js';
import { decodePoints, encodePoints } from '../../../shared/points.js';
import { text } from '../../../shared/text.js';
import type { ReadFile } from '../../workers/messages.js';
import { readInWorker } from '../../workers/pool.js';
import { ApiError } from '../api-error.js';
import { restoredBatch, undoneBatch } from './local-batches.js';
import type { LocalDatabase } from './local-database.js';
import { edited, newRow, type Tell } from './local-rows.js';
import type { AddOptions, ProjectStore, SourceBytes } from './project-store.js';

interface Place {
  readonly database: LocalDatabase;
  readonly projectId: string;
  readonly tell: Tell;
}

async function readHere({ file, fileName }: SourceBytes, overrides: ReadingOverrides, options: AddOptions = {}) {
  const { signal, onProgress } = options;
  const job = readInWorker({ file, fileName, overrides }, (done, total) => onProgress?.(total > 0 ? done / total : 0));
  signal?.addEventListener('abort', job.stop, { once: true });
  const outcome = await job.done;
  if ('refused' in outcome) throw outcome.refused;
  return outcome.file;
}

function revisionFrom(read: ReadFile, sweepId: string, number: number): SweepRevision {
  const { frequencyHz, realOhm } = read.points;
  return {
    id: crypto.randomUUID(),
    sweepId,
    number,
    reading: read.reading,
    findings: read.findings,
    hasPhase: realOhm !== undefined,
    points: frequencyHz.length,
    minFrequencyHz: frequencyHz[0] ?? 0,
    maxFrequencyHz: frequencyHz.at(-1) ?? 0,
    pointsSha256: read.pointsSha256,
    createdAt: new Date().toISOString(),
  };
}

function refuseSecond(rows: readonly SweepRow[], sha256: string): void {
  const same = rows.find((row) => row.deletedAt === null && row.source.sha256 === sha256);
  if (!same) return;
  const extra = { sweepId: same.id, name: same.name };
  throw new ApiError('already-here', text.unpack.alreadyHereAs(same.name), 409, '', [], extra);
}

async function addSweep(place: Place, source: SourceBytes, given: CreateSweep, options: AddOptions): Promise<SweepRow> {
  const read = options.read ?? (await readHere(source, given.reading, options));
  const bytes = new Blob([await source.file.arrayBuffer()]); // before the transaction, which waits for nothing else
  if (options.signal?.aborted) throw new ApiError('stopped', text.errors.stoppedDetail);
  const { reading: _told, ...fields } = given;
  const base = newRow();
  const revision = revisionFrom(read, base.id, 1);
  const { file, fileName } = source;
  const sourceRow = { id: crypto.randomUUID(), fileName, bytes: file.size, sha256: read.sourceSha256 };
  const row: SweepRow = { ...base, ...fields, projectId: place.projectId, source: sourceRow, revision };
  await place.database.change<SweepRow>('sweeps', (rows) => {
    refuseSecond(rows, read.sourceSha256);
    return {
      sweeps: { [row.id]: row },
      revisions: { [revision.id]: revision },
      points: { [revision.pointsSha256]: encodePoints(read.points) },
      sources: { [sourceRow.id]: { file: bytes, fileName } },
    };
  });
  place.tell('sweeps', row.id);
  return row;
}

async function reread(place: Place, sweep: SweepRow, reading: ReadingOverrides, source: SourceBytes) {
  const read = await readHere(source, reading);
  const row = (await place.database.get<SweepRow>('sweeps', sweep.id)) ?? sweep;
  const revision = revisionFrom(read, row.id, row.revision.number + 1);
  const next = edited(row, { revision });
  await place.database.put({
    sweeps: { [row.id]: next },
    revisions: { [revision.id]: revision },
    points: { [revision.pointsSha256]: encodePoints(read.points) },
  });
  place.tell('sweeps', row.id);
  return next;
}

async function changeBatch({ database, tell }: Place, change: (rows: SweepRow[]) => SweepRow[]): Promise<void> {
  await database.change<SweepRow>('sweeps', (rows) => ({
    sweeps: Object.fromEntries(change(rows).map((row) => [row.id, row])),
  }));
  tell('sweeps', '');
}

type SweepMethods = Pick<
  ProjectStore,
  'addSweep' | 'knownSources' | 'sourceBytes' | 'points' | 'revisions' | 'reread' | 'undoBatch' | 'restoreBatch'
>;

/** Everything about sweeps that is more than a row: their files, points and readings, in the browser's database. */
export function localSweeps(place: Place): SweepMethods {
  const { database } = place;
  const sourceBytes = async (sweep: SweepRow): Promise<SourceBytes> => {
    const source = await database.get<SourceBytes>('sources', sweep.source.id);
    if (!source) throw new ApiError('not-found', text.errors.pageMissingDetail, 404);
    return source;
  };
  return {
    addSweep: (source, sweep, options = {}) => addSweep(place, source, sweep, options),
    knownSources: async (sha256) => {
      const rows = (await database.all<SweepRow>('sweeps')).filter((row) => row.deletedAt === null);
      const same = rows.filter((row) => sha256.includes(row.source.sha256));
      return same.map((row) => ({ sha256: row.source.sha256, sweepId: row.id, name: row.name }));
    },
    sourceBytes,
    points: async ({ pointsSha256, points, hasPhase }) => {
      const bytes = await database.get<Uint8Array>('points', pointsSha256);
      if (!bytes) throw new ApiError('not-found', text.errors.pageMissingDetail, 404);
      return decodePoints(bytes, points, hasPhase);
    },
    revisions: async (sweepId) => {
      const all = await database.all<SweepRevision>('revisions');
      return all.filter((revision) => revision.sweepId === sweepId).sort((a, b) => b.number - a.number);
    },
    reread: async (sweep, reading) => reread(place, sweep, reading, await sourceBytes(sweep)),
    undoBatch: (batchId) => changeBatch(place, (rows) => undoneBatch(rows, batchId, new Date().toISOString())),
    restoreBatch: (batchId) => changeBatch(place, (rows) => restoredBatch(rows, batchId)),
  };
}
