import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import {
  closeToast,
  holdToasts,
  releaseToasts,
  runLatestAction,
  shownToasts,
  showToast,
} from '../../../../src/components/toast-store.js';

beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  for (const { id } of shownToasts()) closeToast(id);
  vi.useRealTimers();
});
const messages = () => shownToasts().map(({ message }) => message);

it('shows a message for ten seconds, the time in which a deletion can be taken back', () => {
  showToast({ message: 'In the bin.' });
  vi.advanceTimersByTime(9_900);
  expect(messages()).toEqual(['In the bin.']);
  vi.advanceTimersByTime(200);
  expect(messages()).toEqual([]);
});

it('keeps messages while a pointer or the focus rests on them', () => {
  showToast({ message: 'In the bin.' });
  vi.advanceTimersByTime(9_000);
  holdToasts();
  vi.advanceTimersByTime(60_000);
  expect(messages()).toEqual(['In the bin.']);
  releaseToasts();
  vi.advanceTimersByTime(2_100);
  expect(messages()).toEqual([]);
});

it('keeps the message of a fault until it is closed', () => {
  const id = showToast({ message: 'Not stored.', tone: 'fault' });
  vi.advanceTimersByTime(3_600_000);
  expect(messages()).toEqual(['Not stored.']);
  closeToast(id);
  expect(messages()).toEqual([]);
});

it('runs the newest action for Ctrl Z, once', () => {
  const undoFirst = vi.fn();
  const undoSecond = vi.fn();
  showToast({ message: 'first', action: { label: 'Undo', run: undoFirst } });
  showToast({ message: 'second', action: { label: 'Undo', run: undoSecond } });
  expect(runLatestAction()).toBe(true);
  expect(undoSecond).toHaveBeenCalledTimes(1);
  expect(undoFirst).not.toHaveBeenCalled();
  expect(messages()).toEqual(['first']);
});
