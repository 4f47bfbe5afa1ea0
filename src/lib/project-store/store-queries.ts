import { queryOptions } from '@tanstack/react-query';
import type { SweepRevision } from '../../../shared/contracts/sweep.js';
import type { ProjectStore } from './project-store.js';

const byName = new Intl.Collator(undefined, { numeric: true });

export const sweepsQuery = (store: ProjectStore) =>
  queryOptions({
    queryKey: [store.key, 'sweeps'],
    queryFn: async () => (await store.sweeps.list()).sort((a, b) => byName.compare(a.name, b.name)),
  });
export const sweepQuery = (store: ProjectStore, id: string) =>
  queryOptions({ queryKey: [store.key, 'sweeps', id], queryFn: () => store.sweeps.get(id) });
export const revisionsQuery = (store: ProjectStore, sweepId: string) =>
  queryOptions({ queryKey: [store.key, 'sweeps', sweepId, 'revisions'], queryFn: () => store.revisions(sweepId) });

export const sheetsQuery = (store: ProjectStore) =>
  queryOptions({
    queryKey: [store.key, 'sheets'],
    queryFn: async () => (await store.sheets.list()).sort((a, b) => b.updatedAt.localeCompare(a.updatedAt)),
  });
export const sheetQuery = (store: ProjectStore, id: string) =>
  queryOptions({ queryKey: [store.key, 'sheets', id], queryFn: () => store.sheets.get(id) });

export const resultsQuery = (store: ProjectStore) =>
  queryOptions({ queryKey: [store.key, 'results'], queryFn: () => store.results.list() });
export const itemsQuery = (store: ProjectStore) =>
  queryOptions({
    queryKey: [store.key, 'items'],
    queryFn: async () => (await store.items.list()).sort((a, b) => byName.compare(a.name, b.name)),
  });
export const itemQuery = (store: ProjectStore, id: string) =>
  queryOptions({ queryKey: [store.key, 'items', id], queryFn: () => store.items.get(id) });

/** The points of a revision never change: fetched once, kept while anything may draw them. */
export const pointsQuery = (store: ProjectStore, revision: SweepRevision) =>
  queryOptions({
    queryKey: [store.key, 'points', revision.pointsSha256],
    queryFn: () => store.points(revision),
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 30 * 60_000,
  });
