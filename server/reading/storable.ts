/**
 * A copy of plain data whose texts a database can hold: the character of code 0 is left out, half of a surrogate pair
 * becomes U+FFFD. Comments and column names come from files, so they may hold either.
 */
export function storable<Value>(value: Value): Value {
  if (typeof value === 'string') return value.replaceAll('\u0000', '').replace(/\p{Cs}/gu, '\ufffd') as Value;
  if (Array.isArray(value)) return value.map(storable) as Value;
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, storable(inner)])) as Value;
}
