import type { ChartSweep } from '../chart-input.js';
import { columnsOf } from '../curves/columns.js';
import type { Range } from '../scales/axis-scale.js';

export interface CsvMarks {
  readonly separator: ',' | ';' | '\t';
  readonly decimalMark: '.' | ',';
}
/** Exactly the drawn points, as rows of sweep, frequency, magnitude, phase; every digit that a number holds. */
export function drawnPointsCsv(sweeps: readonly ChartSweep[], range: Range | null, marks: CsvMarks): string {
  const number = (value: number | undefined) =>
    value === undefined || !Number.isFinite(value) ? '' : String(value).replace('.', marks.decimalMark);
  const lines = [['sweep', 'frequency_hz', 'magnitude_ohm', 'phase_deg'].join(marks.separator)];
  for (const sweep of sweeps) {
    const { frequencyHz, magnitudeOhm, phaseDeg } = columnsOf(sweep.points);
    for (let i = 0; i < frequencyHz.length; i += 1) {
      const f = frequencyHz[i] ?? 0;
      if (range && (f < range[0] || f > range[1])) continue;
      const cells = [quoted(sweep.name), number(f), number(magnitudeOhm[i]), number(phaseDeg?.[i])];
      lines.push(cells.join(marks.separator));
    }
  }
  return `${lines.join('\r\n')}\r\n`;
}
/** RFC 4180 quoting; a leading sign that a spreadsheet would take for a formula is kept from being one. */
function quoted(name: string): string {
  const safe = /^[=+\-@\t\r]/.test(name) ? `'${name}` : name;
  return `"${safe.replaceAll('"', '""')}"`;
}
