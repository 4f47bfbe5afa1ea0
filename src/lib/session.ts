import { useSyncExternalStore } from 'react';

/**
 * Whether this browser is signed in, as far as it knows without asking: a hint for what to show first, never a right.
 * When the session ends while a person works, `isAsking` puts the sign-in form over the page; requests wait for it.
 */
export interface SessionState {
  hint: boolean;
  isAsking: boolean;
}
const HINT_KEY = 'hummock.signed-in';
let state: SessionState = { hint: readHint(), isAsking: false };
const listeners = new Set<() => void>();
let waiting: ((signedIn: boolean) => void)[] = [];
let wasSignedIn = false; // while this page was open: only then is there work to lose

function readHint(): boolean {
  try {
    return localStorage.getItem(HINT_KEY) === 'yes';
  } catch {
    return false;
  }
}
function change(next: SessionState): void {
  state = next;
  try {
    if (next.hint) localStorage.setItem(HINT_KEY, 'yes');
    else localStorage.removeItem(HINT_KEY);
  } catch {
    // storage may be switched off; the hint then lives as long as the page
  }
  for (const listener of listeners) listener();
}

export const session = {
  get hint() {
    return state.hint;
  },
  signedIn(): void {
    wasSignedIn = true;
    change({ hint: true, isAsking: false });
    for (const settle of waiting) settle(true);
    waiting = [];
  },
  signedOut(): void {
    wasSignedIn = false;
    change({ hint: false, isAsking: false });
    for (const settle of waiting) settle(false);
    waiting = [];
  },
  /**
   * The session has ended. Asks a person who was at work to sign in again over the page, and answers true once they
   * have; where the hint was merely old, takes it back.
   */
  ended(): Promise<boolean> {
    if (!wasSignedIn) {
      this.signedOut();
      return Promise.resolve(false);
    }
    if (!state.isAsking) change({ ...state, isAsking: true });
    return new Promise((settle) => waiting.push(settle));
  },
};

export function useSessionState(): SessionState {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => state,
  );
}
