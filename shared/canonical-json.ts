/**
 * JSON with one form only: keys sorted by code unit, no white space, no undefined. Two equal values always give the
 * same text, so a hash over it identifies what went into a result or stands in the activity chain.
 * Throws RangeError on a number that JSON cannot hold.
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return JSON.stringify(value);
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError('a number that JSON cannot hold');
    return JSON.stringify(value === 0 ? 0 : value); // −0 is written as 0
  }
  if (value instanceof Date) return JSON.stringify(value);
  if (Array.isArray(value)) return `[${value.map((entry) => canonicalJson(entry ?? null)).join(',')}]`;
  if (ArrayBuffer.isView(value)) return canonicalJson(Array.from(value as Float64Array));
  if (typeof value === 'object') {
    const entries = Object.entries(value).filter(([, entry]) => entry !== undefined);
    entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
    return `{${entries.map(([key, entry]) => `${JSON.stringify(key)}:${canonicalJson(entry)}`).join(',')}}`;
  }
  throw new RangeError(`a ${typeof value} that JSON cannot hold`);
}
