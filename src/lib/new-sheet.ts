import { type CreateSheet, SheetContentSchema } from '../../shared/contracts/sheet.js';
import { text } from '../../shared/text.js';
import { getPreferences } from './preferences.js';

const LINES = 8; // colours, dashes and markers there are

/** A sheet that draws these sweeps, each with a line of its own as far as there are lines. */
export function newSheet(sweepIds: readonly string[], name?: string): CreateSheet {
  const drawn = sweepIds
    .slice(0, 200)
    .map((sweepId, i) => ({ sweepId, lineNumber: (i % LINES) + 1, isReference: false }));
  const date = new Intl.DateTimeFormat(getPreferences().locale ?? undefined, { dateStyle: 'medium' }).format(
    new Date(),
  );
  return { name: name ?? text.project.sheetName(date), content: SheetContentSchema.parse({ drawn }) };
}
