import type { Preferences } from '../../shared/contracts/account.js';
import { updateMe } from './update-me.js';

const UNSENT_KEY = 'hummock.preferences.unsent';
let isSending = false;

/** Changes that the account has not confirmed yet: kept here, so that leaving the page loses none. */
export function unsentPreferences(): Partial<Preferences> {
  return JSON.parse(localStorage.getItem(UNSENT_KEY) ?? '{}') as Partial<Preferences>;
}
function keepUnsent(changes: Partial<Preferences>): void {
  if (Object.keys(changes).length === 0) localStorage.removeItem(UNSENT_KEY);
  else localStorage.setItem(UNSENT_KEY, JSON.stringify(changes));
}
function forgetSent(sent: Partial<Preferences>): void {
  const left = Object.entries(unsentPreferences()).filter(([field, value]) => {
    return JSON.stringify(value) !== JSON.stringify(sent[field as keyof Preferences]);
  });
  keepUnsent(Object.fromEntries(left));
}

async function sendAll(): Promise<void> {
  for (let preferences = unsentPreferences(); Object.keys(preferences).length > 0; preferences = unsentPreferences()) {
    await updateMe({ preferences });
    forgetSent(preferences);
  }
}

/** Sends changed preferences to the account, one after the other; what fails goes with the next change or visit. */
export function sendPreferences(change: Partial<Preferences>): void {
  keepUnsent({ ...unsentPreferences(), ...change });
  if (isSending) return;
  isSending = true;
  void sendAll()
    .catch(() => {}) // this browser keeps the choice
    .finally(() => {
      isSending = false;
    });
}
