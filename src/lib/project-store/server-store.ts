import type { z } from 'zod';
import { ItemPageSchema, ItemSchema } from '../../../shared/contracts/item.js';
import type { Page } from '../../../shared/contracts/paging.js';
import { ResultPageSchema, ResultSchema } from '../../../shared/contracts/result.js';
import { SheetPageSchema, SheetSchema } from '../../../shared/contracts/sheet.js';
import {
  BatchAnswerSchema,
  type CreateSweep,
  KnownSourcesAnswerSchema,
  SweepPageSchema,
  type SweepRevision,
  SweepRevisionPageSchema,
  type SweepRow,
  SweepSchema,
  UploadedSweepSchema,
} from '../../../shared/contracts/sweep.js';
import { decodePoints } from '../../../shared/points.js';
import { api } from '../api.js';
import { mergeEdit } from './merge-edit.js';
import { PointsCache } from './points-cache.js';
import { subscribeToProject } from './project-events.js';
import type { AddOptions, ProjectStore, Rows, SourceBytes } from './project-store.js';

const PAGE = 500;
const pointsCache = new PointsCache();

interface Versioned {
  readonly id: string;
  readonly version: number;
}

/** Every row of a list, page after page. */
export async function allPages<Row>(path: string, page: z.ZodType<Page<Row>>): Promise<Row[]> {
  const rows: Row[] = [];
  let cursor: string | null = '';
  while (cursor !== null) {
    const after: string = cursor === '' ? '' : `&cursor=${encodeURIComponent(cursor)}`;
    const { items, next }: Page<Row> = await api.get(`${path}?limit=${PAGE}${after}`, page);
    rows.push(...items);
    cursor = next;
  }
  return rows;
}

interface RowsAt<Row> {
  collection: string; // /projects/:id/sheets
  single: string; // /sheets
  row: z.ZodType<Row>;
  page: z.ZodType<Page<Row>>;
}
function serverRows<Row extends Versioned, Create, Update extends object>(at: RowsAt<Row>): Rows<Row, Create, Update> {
  const one = (id: string) => `${at.single}/${id}`;
  return {
    list: () => allPages(at.collection, at.page),
    get: (id) => api.get(one(id), at.row),
    add: (row) => api.post(at.collection, row, at.row),
    update: (seen, change, { keepalive = false } = {}) =>
      mergeEdit(
        seen,
        change,
        (version, edited) => api.patch(one(seen.id), edited, at.row, { version, keepalive }),
        () => api.get(one(seen.id), at.row),
      ),
    delete: (seen) => api.delete(one(seen.id), { version: seen.version }),
    restore: (id) => api.post(`${one(id)}/restore`, {}, at.row),
  };
}

async function upload(projectId: string, source: SourceBytes, sweep: CreateSweep, options: AddOptions = {}) {
  const form = new FormData();
  form.append('sweep', JSON.stringify(sweep)); // the fields come before the bytes they belong to
  form.append('file', source.file, source.fileName);
  const answer = await api.upload(`/projects/${projectId}/sources`, form, UploadedSweepSchema, options);
  return answer.sweep;
}

async function pointsOf({ id, pointsSha256, points, hasPhase }: SweepRevision) {
  const bytes = await pointsCache.bytes(pointsSha256, () => api.bytes(`/revisions/${id}/points`));
  return decodePoints(bytes, points, hasPhase);
}

async function sourceBytesOf({ source }: SweepRow): Promise<SourceBytes> {
  const bytes = await api.bytes(`/sources/${source.id}/content`);
  return { file: new Blob([bytes as Uint8Array<ArrayBuffer>]), fileName: source.fileName };
}

/** A project on the server. */
export function serverStore(projectId: string, readOnlyReason?: string): ProjectStore {
  const project = `/projects/${projectId}`;
  const rowsAt = (noun: string) => ({ collection: `${project}/${noun}`, single: `/${noun}` });
  return {
    kind: 'server',
    key: `project:${projectId}`,
    projectId,
    readOnlyReason,
    sweeps: serverRows({ ...rowsAt('sweeps'), row: SweepSchema, page: SweepPageSchema }),
    sheets: serverRows({ ...rowsAt('sheets'), row: SheetSchema, page: SheetPageSchema }),
    results: serverRows({ ...rowsAt('results'), row: ResultSchema, page: ResultPageSchema }),
    items: serverRows({ ...rowsAt('items'), row: ItemSchema, page: ItemPageSchema }),
    addSweep: (source, sweep, options) => upload(projectId, source, sweep, options),
    knownSources: async (sha256) => {
      if (sha256.length === 0) return [];
      return (await api.post(`${project}/sources/known`, { sha256 }, KnownSourcesAnswerSchema)).known;
    },
    sourceBytes: sourceBytesOf,
    points: pointsOf,
    revisions: (sweepId) => allPages(`/sweeps/${sweepId}/revisions`, SweepRevisionPageSchema),
    reread: (sweep, reading) =>
      api.post(`/sweeps/${sweep.id}/revisions`, { reading }, SweepSchema, { version: sweep.version }),
    undoBatch: async (batchId) => {
      await api.post(`${project}/batches/${batchId}/undo`, {}, BatchAnswerSchema);
    },
    restoreBatch: async (batchId) => {
      await api.post(`${project}/batches/${batchId}/restore`, {}, BatchAnswerSchema);
    },
    subscribe: (onChange) => subscribeToProject(projectId, onChange),
  };
}
