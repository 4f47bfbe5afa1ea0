import { type CreateItem, CreateItemSchema, type Item, type UpdateItem } from '../../../shared/contracts/item.js';
import { type CreateResult, CreateResultSchema, type Result } from '../../../shared/contracts/result.js';
import { type CreateSheet, CreateSheetSchema, type Sheet, type UpdateSheet } from '../../../shared/contracts/sheet.js';
import type { SweepRow, UpdateSweep } from '../../../shared/contracts/sweep.js';
import { outOfDateReasons } from '../../../shared/out-of-date.js';
import { resultIdentity } from '../../../shared/result-identity.js';
import { text } from '../../../shared/text.js';
import { LocalDatabase, type LocalStoreName } from './local-database.js';
import { localRows, newRow, type Tell, withDefaults } from './local-rows.js';
import { localSweeps } from './local-sweeps.js';
import type { ProjectStore, StoreEntity } from './project-store.js';

/** The one project of `/try`. */
export const LOCAL_PROJECT_ID = '5f0c8f3e-3c1b-4a52-9a55-2f6f0b7d9c11';
const LOCAL_PERSON_ID = '5f0c8f3e-3c1b-4a52-9a55-2f6f0b7d9c12';

export interface LocalStore extends ProjectStore {
  readonly kind: 'local';
  /** Removes everything from this browser. */
  clear(): Promise<void>;
}

const ENTITY: Partial<Record<LocalStoreName, StoreEntity>> = {
  sweeps: 'sweep',
  sheets: 'sheet',
  results: 'result',
  items: 'item',
};

async function sha256Hex(written: string): Promise<string> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', new TextEncoder().encode(written)));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

async function makeResult(given: CreateResult): Promise<Result> {
  const fields = withDefaults(CreateResultSchema, given);
  return {
    ...newRow(),
    ...fields,
    projectId: LOCAL_PROJECT_ID,
    inputsSha256: await sha256Hex(resultIdentity(fields)),
    createdBy: { id: LOCAL_PERSON_ID, name: text.common.you },
    outOfDate: [],
  };
}

/** Results with what has moved on since they were made. */
async function withReasons(database: LocalDatabase, results: Result[]): Promise<Result[]> {
  if (results.length === 0) return results;
  const { calculatorById } = await import('../../../calculators/index.js');
  const sweeps = new Map((await database.all<SweepRow>('sweeps')).map((row) => [row.id, row]));
  return results.map((result) => {
    const calculator = { made: result.calculatorVersion, now: calculatorById(result.calculatorId)?.version };
    const lineage = result.inputs.map(({ sweepId, pointsSha256 }) => {
      const now = sweeps.get(sweepId);
      const revision = now?.revision ?? { number: 1, pointsSha256 };
      const isNewer = revision.pointsSha256 !== pointsSha256;
      const made = { number: isNewer ? revision.number - 1 : revision.number, pointsSha256 };
      return { sweepId, isDeleted: !now || now.deletedAt !== null, made, now: revision };
    });
    return { ...result, outOfDate: outOfDateReasons({ calculator, setup: undefined, sweeps: lineage }) };
  });
}

/** `/try`: a project that lives in this browser alone, works without a connection and is there after a reload. */
export function localStore(database = new LocalDatabase()): LocalStore {
  const channel = typeof BroadcastChannel === 'undefined' ? undefined : new BroadcastChannel('hummock-try');
  const tell: Tell = (store, id) => channel?.postMessage({ entity: ENTITY[store], id });
  const projectId = LOCAL_PROJECT_ID;
  const shared = { database, tell };
  return {
    kind: 'local',
    key: 'local',
    projectId,
    readOnlyReason: undefined,
    sweeps: localRows<SweepRow, never, UpdateSweep>({ ...shared, store: 'sweeps', make: (row) => row }),
    sheets: localRows<Sheet, CreateSheet, UpdateSheet>({
      ...shared,
      store: 'sheets',
      make: (given) => ({ ...newRow(), ...withDefaults(CreateSheetSchema, given), projectId }),
    }),
    results: localRows<Result, CreateResult, { name: string }>({
      ...shared,
      store: 'results',
      make: makeResult,
      complete: (rows) => withReasons(database, rows),
    }),
    items: localRows<Item, CreateItem, UpdateItem>({
      ...shared,
      store: 'items',
      make: (given) => ({ ...newRow(), ...withDefaults(CreateItemSchema, given), projectId }),
    }),
    ...localSweeps({ ...shared, projectId }),
    subscribe: (onChange) => {
      const listen = ({ data }: MessageEvent<{ entity?: StoreEntity; id: string }>) => {
        if (data.entity) onChange(data.entity, data.id);
      };
      channel?.addEventListener('message', listen);
      return () => channel?.removeEventListener('message', listen);
    },
    clear: async () => {
      await database.clear();
      tell('sweeps', '');
    },
  };
}
