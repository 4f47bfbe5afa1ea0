import { FINDING_SEVERITY, type FindingCode } from '../../../shared/findings.js';
import type { Finding } from '../../../shared/output.js';

/** A finding at the severity its code always has. */
export function finding(
  code: FindingCode,
  message: string,
  extra: Pick<Finding, 'frequency' | 'band' | 'evidence'> = {},
): Finding {
  return { code, severity: FINDING_SEVERITY[code], message, ...extra };
}

export const percent = (share: number, digits = 2): string => `${Number((100 * share).toPrecision(digits))} %`;
export const hertz = (frequencyHz: number): string =>
  frequencyHz >= 1000
    ? `${Number((frequencyHz / 1000).toPrecision(3))} kHz`
    : `${Number(frequencyHz.toPrecision(3))} Hz`;
export const grams = (massKg: number): string => `${Number((1000 * massKg).toPrecision(3))} g`;
export const litres = (volumeM3: number): string => `${Number((1000 * volumeM3).toPrecision(3))} L`;
export const ohms = (resistanceOhm: number): string => `${Number(resistanceOhm.toPrecision(3))} Ω`;
export const listed = (names: readonly string[]): string =>
  names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
