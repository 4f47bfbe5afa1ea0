import { expect, it } from 'vitest';
import { shortDate } from '../../../../src/lib/dates.js';
import { setPreferences } from '../../../../src/lib/preferences.js';

const now = Date.parse('2027-03-03T14:05:00Z');
const ago = (minutes: number) => shortDate(new Date(now - minutes * 60_000).toISOString(), now);

it('is relative under 24 hours', () => {
  expect(ago(0.5)).toBe('just now');
  expect(ago(7)).toBe('7 min ago');
  expect(ago(60)).toBe('1 h ago');
  expect(ago(23 * 60 + 59)).toBe('23 h ago');
});

it('is day and time from then on', () => {
  setPreferences({ locale: 'en-GB' });
  expect(ago(24 * 60)).toMatch(/^2 Mar 2027, \d\d:05$/);
});
