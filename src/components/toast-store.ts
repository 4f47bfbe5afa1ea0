import { useSyncExternalStore } from 'react';

export interface Toast {
  id: number;
  message: string;
  tone: 'note' | 'fault';
  action?: { label: string; run: () => void };
}
type NewToast = Omit<Toast, 'id' | 'tone'> & { tone?: Toast['tone']; forMs?: number };

const SHOWN_MS = 10_000; // the time a deletion can be taken back from its message
let toasts: readonly Toast[] = [];
let lastId = 0;
const listeners = new Set<() => void>();
const timers = new Map<
  number,
  { timer: ReturnType<typeof setTimeout> | undefined; leftMs: number; startedAt: number }
>();

function change(next: readonly Toast[]): void {
  toasts = next;
  for (const listener of listeners) listener();
}

export function closeToast(id: number): void {
  clearTimeout(timers.get(id)?.timer);
  timers.delete(id);
  change(toasts.filter((toast) => toast.id !== id));
}

function startTimer(id: number, leftMs: number): void {
  timers.set(id, { timer: setTimeout(() => closeToast(id), leftMs), leftMs, startedAt: Date.now() });
}

/** Shows a short message, with one action if there is one. Messages of faults stay until they are closed. */
export function showToast({ forMs = SHOWN_MS, tone = 'note', ...toast }: NewToast): number {
  lastId += 1;
  const id = lastId;
  change([...toasts.slice(-3), { ...toast, tone, id }]);
  if (tone !== 'fault') startTimer(id, forMs);
  return id;
}

/** While a pointer or the focus rests on the messages, none of them goes. */
export function holdToasts(): void {
  for (const entry of timers.values()) {
    clearTimeout(entry.timer);
    entry.leftMs = Math.max(2000, entry.leftMs - (Date.now() - entry.startedAt));
  }
}
export function releaseToasts(): void {
  for (const [id, entry] of timers) {
    clearTimeout(entry.timer);
    startTimer(id, entry.leftMs);
  }
}

/** Runs the action of the newest message that has one: what Ctrl Z does outside the sheet. */
export function runLatestAction(): boolean {
  const latest = toasts.findLast((toast) => toast.action);
  if (!latest?.action) return false;
  latest.action.run();
  closeToast(latest.id);
  return true;
}

export function shownToasts(): readonly Toast[] {
  return toasts;
}
export function useToasts(): readonly Toast[] {
  return useSyncExternalStore((listener) => {
    listeners.add(listener);
    return () => listeners.delete(listener);
  }, shownToasts);
}
