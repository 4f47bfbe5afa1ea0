import { type LocalStore, localStore } from './local-store.js';

let opened: LocalStore | undefined;

/** The one store of this browser behind `/try`. */
export function browserStore(): LocalStore {
  opened ??= localStore();
  return opened;
}
