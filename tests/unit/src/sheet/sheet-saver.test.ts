import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { type Sheet, SheetContentSchema } from '../../../../shared/contracts/sheet.js';
import { change } from '../../../../src/features/sheet/sheet-edits.js';
import { type SaveState, SheetSaver } from '../../../../src/features/sheet/sheet-saver.js';
import { ApiError } from '../../../../src/lib/api-error.js';
import { EditConflict, type ProjectStore } from '../../../../src/lib/project-store/project-store.js';

const empty = SheetContentSchema.parse({});
const now = new Date(0).toISOString();
const id = '00000000-0000-4000-8000-000000000001';
const sheet: Sheet = {
  id,
  version: 1,
  createdAt: now,
  updatedAt: now,
  deletedAt: null,
  projectId: id,
  name: 'S',
  content: empty,
};
type Update = ProjectStore['sheets']['update'];

function saverWith(update: Update) {
  const states: SaveState[] = [];
  const theirs: Sheet[] = [];
  const sheets = { update } as ProjectStore['sheets'];
  const saver = new SheetSaver({ sheets, readOnlyReason: undefined }, sheet, {
    onState: (state) => states.push(state),
    onSaved: () => {},
    onTheirs: (_base, row) => theirs.push(row),
  });
  return { saver, states, theirs };
}

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

it('saves once for a burst of edits, and then says saved', async () => {
  const update = vi.fn<Update>(async (seen, { content }) => ({ ...seen, version: 2, content: content ?? empty }));
  const { saver, states } = saverWith(update);
  for (const cursorAHz of [20, 30, 40]) saver.want(change({ cursorAHz })(empty));
  await vi.advanceTimersByTimeAsync(1000);
  expect(update).toHaveBeenCalledTimes(1);
  expect(update.mock.calls[0]?.[1].content?.cursorAHz).toBe(40);
  expect(states.at(-1)).toBe('saved');
});

it('tries again by itself while there is no connection, and loses nothing', async () => {
  const update = vi
    .fn<Update>()
    .mockRejectedValueOnce(new ApiError('offline', 'no connection', 0))
    .mockImplementation(async (seen, { content }) => ({ ...seen, version: 2, content: content ?? empty }));
  const { saver, states } = saverWith(update);
  saver.want(change({ cursorAHz: 30 })(empty));
  await vi.advanceTimersByTimeAsync(700);
  expect(states.at(-1)).toBe('not-saved');
  await vi.advanceTimersByTimeAsync(5000);
  expect(update).toHaveBeenCalledTimes(2);
  expect(states.at(-1)).toBe('saved');
});

it('hands on what somebody else saved, and sends the next edit onto their version', async () => {
  const others = { ...sheet, version: 5, content: change({ cursorAHz: 99 })(empty) };
  const update = vi
    .fn<Update>()
    .mockRejectedValueOnce(new EditConflict(others, ['content']))
    .mockImplementation(async (seen, { content }) => ({ ...seen, version: 6, content: content ?? empty }));
  const { saver, theirs } = saverWith(update);
  saver.want(change({ cursorBHz: 30 })(empty));
  await vi.advanceTimersByTimeAsync(700);
  expect(theirs).toEqual([others]);
  saver.want(change({ cursorBHz: 30 })(others.content));
  await vi.advanceTimersByTimeAsync(700);
  expect(update.mock.calls[1]?.[0].version).toBe(5);
});

it('says that a change was refused instead of trying it again for ever', async () => {
  const update = vi.fn<Update>().mockRejectedValue(new ApiError('access-denied', 'no', 403));
  const { saver, states } = saverWith(update);
  saver.want(change({ cursorAHz: 30 })(empty));
  await vi.advanceTimersByTimeAsync(20_000);
  expect(update).toHaveBeenCalledTimes(1);
  expect(states.at(-1)).toBe('refused');
});

it('sends nothing while a question is open', async () => {
  const update = vi.fn<Update>();
  const { saver } = saverWith(update);
  saver.want(change({ cursorAHz: 30 })(empty));
  saver.hold();
  await vi.advanceTimersByTimeAsync(5000);
  expect(update).not.toHaveBeenCalled();
});
