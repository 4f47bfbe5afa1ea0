import { MeSchema, type Preferences } from '../../shared/contracts/account.js';
import { api } from './api.js';
import { queryClient } from './query-client.js';

let waiting: Partial<Preferences> = {};
let isSending = false;

async function sendAll(): Promise<void> {
  while (Object.keys(waiting).length > 0) {
    const preferences = waiting;
    waiting = {};
    try {
      const saved = await api.patch('/me', { preferences }, MeSchema, { keepalive: true });
      queryClient.setQueryData(['me'], saved);
    } catch {
      return; // this browser keeps the choice; the account gets it with the next one
    }
  }
}

/** Sends a changed preference to the account, one after the other, also when the page is left at once. */
export function sendPreferences(change: Partial<Preferences>): void {
  waiting = { ...waiting, ...change };
  if (isSending) return;
  isSending = true;
  void sendAll().finally(() => {
    isSending = false;
  });
}
