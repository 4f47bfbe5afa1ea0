import type { Card, SheetContent } from '../../../shared/contracts/sheet.js';

/** Edits of a sheet's content: pure, so that undo is the content before. */
export type SheetEdit = (content: SheetContent) => SheetContent;

const LINE_NUMBERS = [1, 2, 3, 4, 5, 6, 7, 8] as const;

/** The line number least used by what is drawn: a sweep keeps its own while it is drawn. */
function freeLineNumber(content: SheetContent): number {
  const uses = LINE_NUMBERS.map((number) => content.drawn.filter(({ lineNumber }) => lineNumber === number).length);
  return LINE_NUMBERS[uses.indexOf(Math.min(...uses))] ?? 1;
}

export const draw =
  (...sweepIds: readonly string[]): SheetEdit =>
  (content) => {
    let current = content;
    for (const sweepId of sweepIds) {
      if (current.drawn.some((line) => line.sweepId === sweepId)) continue;
      const line = { sweepId, lineNumber: freeLineNumber(current), isReference: false };
      current = { ...current, drawn: [...current.drawn, line] };
    }
    return current;
  };

export const putAway =
  (...sweepIds: readonly string[]): SheetEdit =>
  (content) => ({ ...content, drawn: content.drawn.filter(({ sweepId }) => !sweepIds.includes(sweepId)) });

export const drawOnly =
  (sweepId: string): SheetEdit =>
  (content) => {
    const drawn = draw(sweepId)(content).drawn.filter((line) => line.sweepId === sweepId);
    return { ...content, drawn };
  };

/** The sweep that others are compared with; one at a time, and the same again takes the star away. */
export const toggleReference =
  (sweepId: string): SheetEdit =>
  (content) => ({
    ...draw(sweepId)(content),
    drawn: draw(sweepId)(content).drawn.map((line) => ({
      ...line,
      isReference: line.sweepId === sweepId && !line.isReference,
    })),
  });

export const change =
  (part: Partial<Omit<SheetContent, 'drawn' | 'cards'>>): SheetEdit =>
  (content) => ({ ...content, ...part });

export const addCard =
  (card: Card): SheetEdit =>
  (content) => ({ ...content, cards: [...content.cards, card] });

export const changeCard =
  (cardId: string, part: Partial<Omit<Card, 'id'>>): SheetEdit =>
  (content) => ({
    ...content,
    cards: content.cards.map((card) => (card.id === cardId ? { ...card, ...part } : card)),
  });

export const removeCard =
  (cardId: string): SheetEdit =>
  (content) => ({ ...content, cards: content.cards.filter(({ id }) => id !== cardId) });

/** Undo and redo: what was, what is, what was undone. `merge` folds a run of alike edits into one step. */
export interface EditHistory {
  readonly past: readonly SheetContent[];
  readonly present: SheetContent;
  readonly future: readonly SheetContent[];
  readonly lastMerge: string | null;
}
const STEPS_KEPT = 100;

export function startHistory(present: SheetContent): EditHistory {
  return { past: [], present, future: [], lastMerge: null };
}

export function edited(history: EditHistory, edit: SheetEdit, merge: string | null = null): EditHistory {
  const present = edit(history.present);
  if (present === history.present) return history;
  const folds = merge !== null && merge === history.lastMerge;
  const past = folds ? history.past : [...history.past, history.present].slice(-STEPS_KEPT);
  return { past, present, future: [], lastMerge: merge };
}

export function undone(history: EditHistory): EditHistory {
  const present = history.past.at(-1);
  if (present === undefined) return history;
  return { past: history.past.slice(0, -1), present, future: [history.present, ...history.future], lastMerge: null };
}

export function redone(history: EditHistory): EditHistory {
  const [present, ...future] = history.future;
  if (present === undefined) return history;
  return { past: [...history.past, history.present], present, future, lastMerge: null };
}

/** Somebody else's newer content under the own steps: fields that both changed are named, the rest merges. */
export function mergeContents(
  base: SheetContent,
  mine: SheetContent,
  theirs: SheetContent,
): { content: SheetContent; clashes: (keyof SheetContent)[] } {
  const content: SheetContent = { ...theirs };
  const clashes: (keyof SheetContent)[] = [];
  for (const field of Object.keys(base) as (keyof SheetContent)[]) {
    const iChanged = !same(base[field], mine[field]);
    const theyChanged = !same(base[field], theirs[field]);
    if (iChanged) Object.assign(content, { [field]: mine[field] });
    if (iChanged && theyChanged && !same(mine[field], theirs[field])) clashes.push(field);
  }
  return { content, clashes };
}

/** A history with somebody else's edits in every step of it, so that undo takes back one's own and no more. */
export function rebased(history: EditHistory, base: SheetContent, theirs: SheetContent): EditHistory {
  const onto = (content: SheetContent) => mergeContents(base, content, theirs).content;
  return {
    past: history.past.map(onto),
    present: onto(history.present),
    future: history.future.map(onto),
    lastMerge: null,
  };
}

function same(a: unknown, b: unknown): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}
