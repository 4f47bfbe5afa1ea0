import { ApiError } from '../api-error.js';
import { EditConflict } from './project-store.js';

interface Versioned {
  readonly version: number;
}

function isSame(a: unknown, b: unknown): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}

/** The fields of `change` that someone else has changed since `seen`, to another value than ours. */
export function disputedFields<Row extends object>(seen: Row, theirs: Row, change: object): string[] {
  return Object.entries(change).flatMap(([field, ours]) => {
    const before = seen[field as keyof Row];
    const now = theirs[field as keyof Row];
    return ours === undefined || isSame(before, now) || isSame(now, ours) ? [] : [field];
  });
}

/** Of an edit, what differs from the row as it was seen: a form hands over every field, edited or not. */
function editedFields<Row extends object, Change extends object>(seen: Row, change: Change): Change {
  const fields = Object.entries(change).filter(([field, ours]) => !isSame(seen[field as keyof Row], ours));
  return Object.fromEntries(fields) as Change;
}

/**
 * Sends what was edited of the version that was seen. Where someone else was faster, the edit goes again onto their
 * version if it touches other fields; the same field edited twice is an EditConflict.
 */
export async function mergeEdit<Row extends Versioned, Change extends object>(
  seen: Row,
  change: Change,
  send: (version: number, edited: Change) => Promise<Row>,
  fetchNewest: () => Promise<Row>,
): Promise<Row> {
  const edited = editedFields(seen, change);
  if (Object.keys(edited).length === 0) return seen;
  try {
    return await send(seen.version, edited);
  } catch (error) {
    if (!(error instanceof ApiError) || error.code !== 'version-conflict') throw error;
    const theirs = await fetchNewest();
    const fields = disputedFields(seen, theirs, edited);
    if (fields.length > 0) throw new EditConflict(theirs, fields);
    return send(theirs.version, edited);
  }
}
