import { useSyncExternalStore } from 'react';
import type { Preferences } from '../../shared/contracts/account.js';

/**
 * How this person likes the screen. Kept in the browser, so that the first paint is right and `/try` has it too; with
 * an account the server's copy wins when it arrives, and every change is sent to it.
 */
const KEY = 'hummock.preferences'; // public/first-paint.js reads the same
const DEFAULTS: Preferences = {
  theme: 'system',
  units: 'metric',
  density: 'comfortable',
  symbolsFirst: false,
  letterKeys: true,
  locale: null,
  paneSizes: {},
};

let current: Preferences = { ...DEFAULTS, ...stored() };
const listeners = new Set<() => void>();
let sendChange: ((change: Partial<Preferences>) => void) | undefined;

function stored(): Partial<Preferences> {
  try {
    return JSON.parse(localStorage.getItem(KEY) ?? '{}') as Partial<Preferences>;
  } catch {
    return {};
  }
}

function prefersDark(): boolean {
  return window.matchMedia?.('(prefers-color-scheme: dark)').matches ?? false;
}

function applyToPage(): void {
  const isDark = current.theme === 'dark' || (current.theme === 'system' && prefersDark());
  document.documentElement.dataset.theme = isDark ? 'dark' : 'light';
  document.documentElement.dataset.density = current.density;
}

function take(next: Preferences): void {
  current = next;
  try {
    localStorage.setItem(KEY, JSON.stringify(next));
  } catch {
    // storage may be switched off; the choice then lives as long as the page
  }
  applyToPage();
  for (const listener of listeners) listener();
}

export function getPreferences(): Preferences {
  return current;
}
export function setPreferences(change: Partial<Preferences>): void {
  take({ ...current, ...change });
  sendChange?.(change);
}
/** The account's copy has arrived; from now on changes go there too. */
export function joinAccountPreferences(account: Preferences, send: (change: Partial<Preferences>) => void): void {
  take(account);
  sendChange = send;
}
export function leaveAccountPreferences(): void {
  sendChange = undefined;
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
export function usePreferences(): Preferences {
  return useSyncExternalStore(subscribe, getPreferences);
}

function subscribeToSystem(listener: () => void): () => void {
  const query = window.matchMedia('(prefers-color-scheme: dark)');
  query.addEventListener('change', listener);
  return () => query.removeEventListener('change', listener);
}

/** Starts following the system's theme. Called once, by main. */
export function startPreferences(): void {
  applyToPage();
  subscribeToSystem(applyToPage);
}
