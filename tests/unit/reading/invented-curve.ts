/**
 * An invented driver in free air in closed form, for files to be written from: fs 38 Hz, Qms 6.5, Res 100 Ω, Re 5.7 Ω and a coil of
 * 0.2 mH in series with 0.13 mH beside 2.4 Ω. Sixty points from 10 Hz to 20 kHz.
 */
export const frequencies: readonly number[] = Array.from({ length: 60 }, (_, i) => 10 * 2000 ** (i / 59));

const impedances = frequencies.map((f) => {
  const w = 2 * Math.PI * f;
  const x = 6.5 * (f / 38 - 38 / f);
  const shunt = w * 0.13e-3;
  const re = 5.7 + 100 / (1 + x * x) + (2.4 * shunt * shunt) / (2.4 ** 2 + shunt * shunt);
  const im = (-100 * x) / (1 + x * x) + w * 0.2e-3 + (2.4 ** 2 * shunt) / (2.4 ** 2 + shunt * shunt);
  return { re, im };
});
export const real = impedances.map(({ re }) => re);
export const imaginary = impedances.map(({ im }) => im);
export const magnitude = impedances.map(({ re, im }) => Math.hypot(re, im));
export const phaseDeg = impedances.map(({ re, im }) => (Math.atan2(im, re) * 180) / Math.PI);
export const phaseRad = impedances.map(({ re, im }) => Math.atan2(im, re));

/** Lines of the columns, written by `cell` (six decimals by default) and joined by the separator, each line closed. */
export function table(
  columns: readonly (readonly number[])[],
  separator = '\t',
  cell: (value: number) => string = (value) => value.toFixed(6),
): string {
  const first = columns[0] ?? [];
  return `${first.map((_, row) => columns.map((column) => cell(column[row] ?? 0)).join(separator)).join('\n')}\n`;
}

export const comma = (value: number): string => value.toFixed(6).replace('.', ',');
export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);
