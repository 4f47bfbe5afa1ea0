import { useQueryClient } from '@tanstack/react-query';
import { createContext, type ReactNode, useContext, useEffect } from 'react';
import type { ProjectStore, StoreEntity } from './project-store.js';

const StoreContext = createContext<ProjectStore | undefined>(undefined);

const KIND = { project: 'project', item: 'items', sweep: 'sweeps', sheet: 'sheets', result: 'results' } as const;

/** The query keys that a change of such a row puts out of date. Results depend on the readings of their sweeps. */
function touchedKinds(entity: StoreEntity): string[] {
  return entity === 'sweep' ? [KIND.sweep, KIND.result] : [KIND[entity]];
}

/** Gives the screens below a project, and keeps them current with what others change in it. */
export function ProjectStoreProvider({ store, children }: { store: ProjectStore; children: ReactNode }) {
  const queryClient = useQueryClient();
  useEffect(
    () =>
      store.subscribe((entity) => {
        for (const kind of touchedKinds(entity)) void queryClient.invalidateQueries({ queryKey: [store.key, kind] });
      }),
    [store, queryClient],
  );
  return <StoreContext value={store}>{children}</StoreContext>;
}

export function useProjectStore(): ProjectStore {
  const store = useContext(StoreContext);
  if (!store) throw new Error('useProjectStore outside a ProjectStoreProvider');
  return store;
}
