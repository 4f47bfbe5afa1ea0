import type { EntityManager } from 'typeorm';

/** What the server does later, by name, with what each is told. */
export interface TaskPayloads {
  'send-letter': { kind: 'verify' | 'register' | 'reset'; email: string };
  'purge-bin': Record<string, never>;
  'verify-chains': Record<string, never>;
}
export type TaskName = keyof TaskPayloads;
export type Tasks = { readonly [Name in TaskName]: (payload: TaskPayloads[Name]) => Promise<void> };

/** A queue whose entry is part of the transaction that asks for it: no change without its letter, no letter without. */
export interface Jobs {
  add<Name extends TaskName>(manager: EntityManager, name: Name, payload: TaskPayloads[Name]): Promise<void>;
}
