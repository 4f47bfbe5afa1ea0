import { expect, it, vi } from 'vitest';
import { ApiError } from '../../../../src/lib/api-error.js';
import { disputedFields, mergeEdit } from '../../../../src/lib/project-store/merge-edit.js';
import { EditConflict } from '../../../../src/lib/project-store/project-store.js';

interface Row {
  version: number;
  name: string;
  note: string;
}
const seen: Row = { version: 1, name: 'Woofer', note: '' };

/** A server that holds `row` and refuses edits of other versions, as the API does. */
function serverWith(row: Row) {
  let held = row;
  return {
    send: () =>
      vi.fn(async (version: number, change: Partial<Row>) => {
        if (version !== held.version) throw new ApiError('version-conflict', 'edited meanwhile', 409);
        held = { ...held, ...change, version: held.version + 1 };
        return held;
      }),
    fetchNewest: async () => held,
  };
}

it('sends the edit once when nobody else was there', async () => {
  const server = serverWith(seen);
  const send = server.send();
  expect(await mergeEdit(seen, { name: 'Mid-woofer' }, send, server.fetchNewest)).toMatchObject({ name: 'Mid-woofer' });
  expect(send).toHaveBeenCalledTimes(1);
});

it('merges an edit of one field with another person’s edit of another field', async () => {
  const server = serverWith({ ...seen, version: 2, note: 'rear vent free' });
  const send = server.send();
  const merged = await mergeEdit(seen, { name: 'Mid-woofer' }, send, server.fetchNewest);
  expect(merged).toEqual({ version: 3, name: 'Mid-woofer', note: 'rear vent free' });
});

it('asks when both changed the same field, and hands over the other value', async () => {
  const server = serverWith({ ...seen, version: 2, name: 'Bass' });
  const send = server.send();
  const conflict = await mergeEdit(seen, { name: 'Mid-woofer' }, send, server.fetchNewest).catch((e: unknown) => e);
  expect(conflict).toBeInstanceOf(EditConflict);
  expect(conflict).toMatchObject({ fields: ['name'], theirs: { name: 'Bass' } });
});

it('leaves alone what a form handed over unedited, so that another person’s edit of it holds', async () => {
  const server = serverWith({ ...seen, version: 2, note: 'rear vent free' });
  const change = { name: 'Mid-woofer', note: '' };
  expect(await mergeEdit(seen, change, server.send(), server.fetchNewest)).toMatchObject({ note: 'rear vent free' });
});

it('sends nothing when nothing was edited', async () => {
  const send = serverWith(seen).send();
  expect(await mergeEdit(seen, { name: seen.name }, send, async () => seen)).toBe(seen);
  expect(send).not.toHaveBeenCalled();
});

it('finds nothing to dispute when both wrote the same', () => {
  expect(disputedFields(seen, { ...seen, name: 'Bass' }, { name: 'Bass' })).toEqual([]);
});

it('passes every other refusal on', async () => {
  const refuse = () => Promise.reject(new ApiError('access-denied', 'no', 403));
  await expect(mergeEdit(seen, { name: 'x' }, refuse, async () => seen)).rejects.toMatchObject({
    code: 'access-denied',
  });
});
