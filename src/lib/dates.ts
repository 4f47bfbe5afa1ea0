import { text } from '../../shared/text.js';
import { getPreferences } from './preferences.js';

const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;

function locale(): string | undefined {
  return getPreferences().locale ?? undefined;
}

/** Relative under 24 h, then "3 Mar 2027, 14:05". */
export function shortDate(iso: string, now: number = Date.now()): string {
  const age = now - Date.parse(iso);
  if (age < HOUR_MS) return text.common.minutesAgo(Math.max(0, Math.floor(age / MINUTE_MS)));
  if (age < DAY_MS) return text.common.hoursAgo(Math.floor(age / HOUR_MS));
  return new Intl.DateTimeFormat(locale(), { dateStyle: 'medium', timeStyle: 'short' }).format(new Date(iso));
}
/** To the second, for tooltips and screen readers. */
export function exactDate(iso: string): string {
  return new Intl.DateTimeFormat(locale(), { dateStyle: 'full', timeStyle: 'medium' }).format(new Date(iso));
}
