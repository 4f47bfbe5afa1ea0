import { formatQuantity } from '../../shared/quantity-text.js';
import { getPreferences } from './preferences.js';

/** A quantity as this person reads it: their units, their decimal mark. */
export function shownQuantity(valueSi: number, si: string, digits?: number): string {
  const { units, locale } = getPreferences();
  return formatQuantity(valueSi, si, { system: units, locale: locale ?? undefined, ...(digits ? { digits } : {}) });
}
/** "10 Hz to 20 kHz". */
export function shownRange(lowHz: number, highHz: number): string {
  return `${shownQuantity(lowHz, 'Hz', 3)}\u2009–\u2009${shownQuantity(highHz, 'Hz', 3)}`;
}
