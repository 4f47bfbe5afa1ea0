import { useMemo } from 'react';
import { markLines, type PreviewLine } from '../../../calculators/reading/preview-lines.js';
import type { COLUMN_KINDS, Reading } from '../../../shared/contracts/reading.js';
import { text } from '../../../shared/text.js';
import { classNames } from '../../lib/class-names.js';

type ColumnKind = (typeof COLUMN_KINDS)[number];

/** One wash per kind of column; the legend above the lines names them, so colour is never alone. */
const WASH: Record<ColumnKind, string> = {
  frequency: 'bg-info-wash text-info',
  magnitude: 'bg-heather-wash text-heather',
  phase: 'bg-within-wash text-within',
  real: 'bg-heather-wash text-heather',
  imaginary: 'bg-within-wash text-within',
  ignore: '',
};
const LINE_LOOK: Record<PreviewLine['kind'], string> = {
  blank: '',
  comment: 'text-soft italic',
  header: 'text-soft',
  data: '',
  skipped: 'text-out line-through',
};
const MOST_LINES = 24;

/** The first lines as they stand in the file, each column in the colour of what it is read as. */
export function FileLines({ lines, reading }: { lines: readonly string[]; reading: Reading | undefined }) {
  const marked = useMemo(
    () => (reading ? markLines(lines.slice(0, MOST_LINES), reading) : undefined),
    [lines, reading],
  );
  const kinds = [...new Set(reading?.columns ?? [])].filter((kind) => kind !== 'ignore');
  return (
    <div>
      {kinds.length > 0 && (
        <ul className="mb-2 flex flex-wrap gap-2 text-note">
          {kinds.map((kind) => (
            <li key={kind} className={classNames('rounded-tag px-2', WASH[kind])}>
              {text.unpack.rule.options.columns[kind]}
            </li>
          ))}
        </ul>
      )}
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a box that scrolls has to be reachable by keys */}
      <pre tabIndex={0} className="max-h-80 overflow-auto bg-sunken p-3 font-num text-note">
        {marked
          ? marked.map((line) => <Line key={line.number} line={line} />)
          : lines.slice(0, MOST_LINES).map((line, i) => `${String(i + 1).padStart(3)}  ${line}\n`)}
      </pre>
    </div>
  );
}

function Line({ line: { number, text: written, kind, spans } }: { line: PreviewLine }) {
  const parts: { key: number; className: string; part: string }[] = [];
  let at = 0;
  for (const { start, end, kind: column } of spans) {
    parts.push({ key: at, className: '', part: written.slice(at, start) });
    parts.push({ key: start + 0.5, className: WASH[column], part: written.slice(start, end) });
    at = end;
  }
  parts.push({ key: at + 0.7, className: '', part: written.slice(at) });
  return (
    <span className={classNames('block', LINE_LOOK[kind])}>
      <span aria-hidden className="me-3 inline-block w-6 text-end text-soft select-none">
        {number}
      </span>
      {parts.map(({ key, className, part }) => (
        <span key={key} className={className}>
          {part}
        </span>
      ))}
    </span>
  );
}
