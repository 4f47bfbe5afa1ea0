import { expect, it } from 'vitest';
import { SheetContentSchema } from '../../../../shared/contracts/sheet.js';
import * as edits from '../../../../src/features/sheet/sheet-edits.js';

const empty = SheetContentSchema.parse({});
const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;

it('gives each drawn sweep a line of its own and lets it keep that line while others come and go', () => {
  const three = edits.draw(id(1), id(2), id(3))(empty);
  expect(three.drawn.map((line) => line.lineNumber)).toEqual([1, 2, 3]);
  const two = edits.putAway(id(2))(three);
  const again = edits.draw(id(4))(two);
  expect(again.drawn.map(({ sweepId, lineNumber }) => [sweepId, lineNumber])).toEqual([
    [id(1), 1],
    [id(3), 3],
    [id(4), 2],
  ]);
});

it('keeps one reference at a time, and takes the star away when it is given again', () => {
  const starred = edits.toggleReference(id(2))(edits.toggleReference(id(1))(edits.draw(id(1), id(2))(empty)));
  expect(starred.drawn.map((line) => line.isReference)).toEqual([false, true]);
  expect(
    edits
      .toggleReference(id(2))(starred)
      .drawn.map((line) => line.isReference),
  ).toEqual([false, false]);
});

it('undoes and redoes whole steps, and folds a drag into one step', () => {
  let history = edits.startHistory(empty);
  history = edits.edited(history, edits.draw(id(1)));
  for (const hz of [20, 21, 22]) history = edits.edited(history, edits.change({ cursorAHz: hz }), 'cursor-a');
  expect(history.present.cursorAHz).toBe(22);
  history = edits.undone(history);
  expect(history.present.cursorAHz).toBeNull();
  expect(history.present.drawn).toHaveLength(1);
  expect(edits.redone(history).present.cursorAHz).toBe(22);
});

it('merges what two people changed in different places and names what both changed', () => {
  const mine = edits.change({ cursorAHz: 40, frequencyScale: 'linear' })(empty);
  const theirs = edits.change({ cursorAHz: 50, magnitudeScale: 'linear' })(empty);
  const { content, clashes } = edits.mergeContents(empty, mine, theirs);
  expect(clashes).toEqual(['cursorAHz']);
  expect(content).toMatchObject({ frequencyScale: 'linear', magnitudeScale: 'linear', cursorAHz: 40 });
});

it('undoes only one’s own edits after somebody else’s were merged in', () => {
  const own = edits.edited(edits.startHistory(empty), edits.change({ cursorAHz: 40 }));
  const theirs = edits.change({ magnitudeScale: 'linear' })(empty);
  const undone = edits.undone(edits.rebased(own, empty, theirs));
  expect(undone.present).toMatchObject({ cursorAHz: null, magnitudeScale: 'linear' });
});
