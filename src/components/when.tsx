import { exactDate, shortDate } from '../lib/dates.js';

/** A moment in words; the exact time stands in the tooltip and is what a screen reader says. */
export function When({ iso }: { iso: string }) {
  const exact = exactDate(iso);
  return (
    <time dateTime={iso} title={exact}>
      <span aria-hidden>{shortDate(iso)}</span>
      <span className="sr-only">{exact}</span>
    </time>
  );
}
