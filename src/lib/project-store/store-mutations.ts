import { type QueryClient, useMutation, useQueryClient } from '@tanstack/react-query';
import type { CreateItem, Item, UpdateItem } from '../../../shared/contracts/item.js';
import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { CreateResult, Result } from '../../../shared/contracts/result.js';
import type { CreateSheet, Sheet, UpdateSheet } from '../../../shared/contracts/sheet.js';
import type { SweepRow, UpdateSweep } from '../../../shared/contracts/sweep.js';
import type { ProjectStore, Rows } from './project-store.js';
import { useProjectStore } from './store-context.js';

interface Kinds {
  sweeps: { row: SweepRow; create: never; update: UpdateSweep };
  sheets: { row: Sheet; create: CreateSheet; update: UpdateSheet };
  results: { row: Result; create: CreateResult; update: { name: string } };
  items: { row: Item; create: CreateItem; update: UpdateItem };
}
export type RowKind = keyof Kinds;

function rowsOf<K extends RowKind>(store: ProjectStore, kind: K) {
  return store[kind] as unknown as Rows<Kinds[K]['row'], Kinds[K]['create'], Kinds[K]['update']>;
}

/** Puts a row into the lists that hold it, so that the screen shows an answer before the next fetch. */
function showRow<Row extends { id: string }>(client: QueryClient, store: ProjectStore, kind: RowKind, row: Row): void {
  client.setQueryData<Row>([store.key, kind, row.id], row);
  client.setQueryData<Row[]>([store.key, kind], (rows) => rows?.map((other) => (other.id === row.id ? row : other)));
}
function fetchAgain(client: QueryClient, store: ProjectStore, kind: RowKind): Promise<unknown> {
  const kinds: RowKind[] = kind === 'sweeps' ? ['sweeps', 'results'] : [kind];
  const touched = kinds.map((each) => client.invalidateQueries({ queryKey: [store.key, each] }));
  if (store.kind === 'server') touched.push(client.invalidateQueries({ queryKey: ['projects'] })); // counts
  return Promise.all(touched);
}

/** Fetches the lists of a kind again, with what depends on them. */
export function useFetchAgain(kind: RowKind): () => Promise<unknown> {
  const store = useProjectStore();
  const client = useQueryClient();
  return () => fetchAgain(client, store, kind);
}

export function useAddRow<K extends RowKind>(kind: K) {
  const store = useProjectStore();
  const client = useQueryClient();
  return useMutation({
    mutationFn: (row: Kinds[K]['create']) => rowsOf(store, kind).add(row),
    onSuccess: () => fetchAgain(client, store, kind),
  });
}

/** An edit shows at once and is taken back if it is refused. */
export function useUpdateRow<K extends RowKind>(kind: K) {
  const store = useProjectStore();
  const client = useQueryClient();
  type Edit = { seen: Kinds[K]['row']; change: Kinds[K]['update'] };
  return useMutation({
    mutationFn: ({ seen, change }: Edit) => rowsOf(store, kind).update(seen, change),
    onMutate: ({ seen, change }: Edit) => showRow(client, store, kind, { ...seen, ...change }),
    onSuccess: (row) => showRow(client, store, kind, row),
    onError: (_error, { seen }) => showRow(client, store, kind, seen),
    onSettled: () => fetchAgain(client, store, kind),
  });
}

export function useDeleteRow(kind: RowKind) {
  const store = useProjectStore();
  const client = useQueryClient();
  return useMutation({
    mutationFn: (seen: Kinds[RowKind]['row']) => rowsOf(store, kind).delete(seen),
    onSuccess: () => fetchAgain(client, store, kind),
  });
}
export function useRestoreRow(kind: RowKind) {
  const store = useProjectStore();
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => rowsOf(store, kind).restore(id),
    onSuccess: () => fetchAgain(client, store, kind),
  });
}

export function useReread() {
  const store = useProjectStore();
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ sweep, reading }: { sweep: SweepRow; reading: ReadingOverrides }) => store.reread(sweep, reading),
    onSuccess: () => fetchAgain(client, store, 'sweeps'),
  });
}
