import type { z } from 'zod';
import { text } from '../../../shared/text.js';
import { ApiError } from '../api-error.js';
import type { LocalDatabase, LocalStoreName } from './local-database.js';
import { mergeEdit } from './merge-edit.js';
import type { Rows } from './project-store.js';

export interface LocalRow {
  readonly id: string;
  readonly version: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly deletedAt: string | null;
}
export type Tell = (store: LocalStoreName, id: string) => void;

export function newRow(): LocalRow {
  const now = new Date().toISOString();
  return { id: crypto.randomUUID(), version: 1, createdAt: now, updatedAt: now, deletedAt: null };
}
export function edited<Row extends LocalRow>(row: Row, change: Partial<Row>): Row {
  return { ...row, ...change, version: row.version + 1, updatedAt: new Date().toISOString() };
}

interface LocalRowsOptions<Row, Create> {
  database: LocalDatabase;
  store: LocalStoreName;
  make: (given: Create) => Row | Promise<Row>;
  /** What is computed anew each time it is read. */
  complete?: (rows: Row[]) => Promise<Row[]>;
  tell: Tell;
}

/** Rows of one kind in the browser's database, with the same versions, conflicts and bin as on the server. */
export function localRows<Row extends LocalRow, Create, Update extends object>(
  options: LocalRowsOptions<Row, Create>,
): Rows<Row, Create, Update> {
  const { database, store, make, tell, complete = async (rows) => rows } = options;
  const get = async (id: string): Promise<Row> => {
    const row = await database.get<Row>(store, id);
    if (!row) throw new ApiError('not-found', text.errors.pageMissingDetail, 404);
    return row;
  };
  const put = async (row: Row): Promise<Row> => {
    await database.put({ [store]: { [row.id]: row } });
    tell(store, row.id);
    return row;
  };
  const updateVersion = async (id: string, version: number, change: object): Promise<Row> => {
    const row = await get(id);
    if (row.version !== version) throw new ApiError('version-conflict', text.errors.titles['version-conflict'], 409);
    return put(edited(row, change as Partial<Row>));
  };
  return {
    list: async () => complete((await database.all<Row>(store)).filter((row) => row.deletedAt === null)),
    get: async (id) => (await complete([await get(id)]))[0] ?? get(id),
    add: async (given) => put(await make(given)),
    update: (seen, change) =>
      mergeEdit(
        seen,
        change,
        (version, edit) => updateVersion(seen.id, version, edit),
        () => get(seen.id),
      ),
    delete: async ({ id }) => {
      await put(edited(await get(id), { deletedAt: new Date().toISOString() } as Partial<Row>));
    },
    restore: async (id) => put(edited(await get(id), { deletedAt: null } as Partial<Row>)),
  };
}

/** Defaults filled in as the server would. */
export function withDefaults<Schema extends z.ZodType>(schema: Schema, given: z.input<Schema>): z.output<Schema> {
  return schema.parse(given);
}
