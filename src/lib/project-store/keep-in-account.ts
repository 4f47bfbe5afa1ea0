import type { CreateResult, Result } from '../../../shared/contracts/result.js';
import type { Card, Sheet, SheetContent } from '../../../shared/contracts/sheet.js';
import type { SweepRevision, SweepRow } from '../../../shared/contracts/sweep.js';
import { toldOverrides } from '../told-overrides.js';
import type { LocalStore } from './local-store.js';
import type { ProjectStore } from './project-store.js';
import { alreadyHere } from './refusals.js';

/** Where each thing of the browser went. Kept until all is moved, so that a broken-off move goes on where it was. */
interface Moved {
  projectId: string;
  items: Record<string, string>;
  sweeps: Record<string, string>;
  revisions: Record<string, string>;
  sheets: Record<string, string>;
  results: Record<string, string>;
}
const JOURNAL = 'hummock.keep';

function openJournal(projectId: string): Moved {
  const empty: Moved = { projectId, items: {}, sweeps: {}, revisions: {}, sheets: {}, results: {} };
  const kept: Moved = JSON.parse(localStorage.getItem(JOURNAL) ?? 'null') ?? empty;
  return kept.projectId === projectId ? kept : empty;
}
function note(moved: Moved): void {
  localStorage.setItem(JOURNAL, JSON.stringify(moved));
}

export type KeepProgress = (done: number, total: number) => void;

/**
 * Moves everything of `/try` into a project of the account: items, sources byte for byte with every reading, sheets
 * and kept results; then empties the browser's copy. Answers where each sheet went, and which results were left out
 * because the account's readings of their sweeps give other points. Whatever fails leaves the browser's copy whole, and
 * the next try goes on where this one ended.
 */
export async function keepInAccount(local: LocalStore, account: ProjectStore, onProgress: KeepProgress = () => {}) {
  const [items, sweeps, sheets, results] = await Promise.all([
    local.items.list(),
    local.sweeps.list(),
    local.sheets.list(),
    local.results.list(),
  ]);
  const moved = openJournal(account.projectId);
  const total = items.length + sweeps.length + sheets.length + results.length;
  let done = 0;
  const each = async <Row extends { id: string }>(
    rows: Row[],
    kind: keyof Omit<Moved, 'projectId'>,
    move: Mover<Row>,
  ) => {
    for (const row of rows) {
      const id = moved[kind][row.id] ?? (await move(row));
      if (id !== undefined) moved[kind][row.id] = id;
      note(moved);
      done += 1;
      onProgress(done, total);
    }
  };
  await each(items, 'items', async ({ kind, name, serial, note: remark, published }) => {
    return (await account.items.add({ kind, name, serial, note: remark, published })).id;
  });
  await each(sweeps, 'sweeps', (sweep) => moveSweep(sweep, local, account, moved));
  await each(sheets, 'sheets', async ({ name, content }) => {
    return (await account.sheets.add({ name, content: movedContent(content, moved) })).id;
  });
  await each(results, 'results', async (result) => {
    const asked = movedResult(result, moved);
    return asked && (await account.results.add(asked)).id;
  });
  await joinCardsToResults(sheets, account, moved);
  await local.clear();
  localStorage.removeItem(JOURNAL);
  const leftOut = results.filter(({ id }) => moved.results[id] === undefined);
  return { sheets: moved.sheets, leftOut: leftOut.map(({ name, calculatorId }) => ({ name, calculatorId })) };
}
type Mover<Row> = (row: Row) => Promise<string | undefined>;

/**
 * Points tell whether a reading there is the same as one here: a file that the project has already may have been read
 * by another rule. It is read again by the rule of here then; what even so gives other points has no revision there.
 */
async function moveSweep(sweep: SweepRow, local: LocalStore, account: ProjectStore, moved: Moved): Promise<string> {
  const source = await local.sourceBytes(sweep);
  const readings = (await local.revisions(sweep.id)).sort((a, b) => a.number - b.number);
  const { name, conditions, group, tags, batchId } = sweep;
  const itemId = sweep.itemId === null ? null : (moved.items[sweep.itemId] ?? null);
  const reading = toldOverrides((readings[0] ?? sweep.revision).reading);
  const asked = { name, conditions, group, tags, batchId, itemId, reading };
  let known: SweepRevision[] | undefined; // the readings of a file that was there before
  let row = await account.addSweep(source, asked).catch(async (error: unknown) => {
    const here = alreadyHere(error);
    if (!here) throw error;
    known = await account.revisions(here.sweepId);
    return account.sweeps.get(here.sweepId);
  });
  for (const [i, revision] of readings.entries()) {
    const isSame = ({ pointsSha256 }: SweepRevision) => pointsSha256 === revision.pointsSha256;
    const before = known?.find(isSame);
    if (!before && (known || i > 0)) row = await account.reread(row, toldOverrides(revision.reading));
    const there = before ?? row.revision;
    if (isSame(there)) moved.revisions[revision.id] = there.id;
  }
  return row.id;
}

const through = (ids: Record<string, string>, id: string) => ids[id] ?? id;

function movedContent(content: SheetContent, moved: Moved): SheetContent {
  return {
    ...content,
    drawn: content.drawn.map((drawn) => ({ ...drawn, sweepId: through(moved.sweeps, drawn.sweepId) })),
    cards: content.cards.map((card) => movedCard(card, moved)),
  };
}
function movedCard(card: Card, moved: Moved): Card {
  const roles = Object.entries(card.inputs).map(([role, inputs]) => [
    role,
    inputs.map((input) => ({ ...input, sweepId: through(moved.sweeps, input.sweepId) })),
  ]);
  return { ...card, inputs: Object.fromEntries(roles), resultId: null }; // joined again once the results are moved
}

/** Undefined where a reading it was made from has none of the same points in the account: it could not be stored. */
function movedResult(result: Result, moved: Moved): CreateResult | undefined {
  if (!result.inputs.every(({ revisionId }) => moved.revisions[revisionId])) return undefined;
  const { name, calculatorId, calculatorVersion, settings, settingsVersion, seed, output } = result;
  return {
    ...{ name, calculatorId, calculatorVersion, settings, settingsVersion, seed, output },
    setupVersionId: null,
    sheetId: result.sheetId === null ? null : (moved.sheets[result.sheetId] ?? null),
    itemId: result.itemId === null ? null : (moved.items[result.itemId] ?? null),
    inputs: result.inputs.map((input) => ({
      ...input,
      sweepId: through(moved.sweeps, input.sweepId),
      revisionId: through(moved.revisions, input.revisionId),
    })),
  };
}

/** Cards name the result they keep; both sides exist only now. */
async function joinCardsToResults(sheets: Sheet[], account: ProjectStore, moved: Moved): Promise<void> {
  for (const sheet of sheets) {
    const resultIds = new Map(sheet.content.cards.map(({ id, resultId }) => [id, moved.results[resultId ?? '']]));
    if (![...resultIds.values()].some(Boolean)) continue;
    const there = await account.sheets.get(through(moved.sheets, sheet.id));
    const cards = there.content.cards.map((card) => ({ ...card, resultId: resultIds.get(card.id) ?? null }));
    await account.sheets.update(there, { content: { ...there.content, cards } });
  }
}
