import { describe, expect, it } from 'vitest';
import {
  coverageFactor,
  formatDecimals,
  formatForField,
  formatInterval,
  formatPlain,
  formatQuantity,
  formatUncertain,
} from '../../../shared/quantity-text.js';

const GAP = '\u00A0';
const en = { locale: 'en' };

describe('numbers as people read them', () => {
  it('puts a no-break space before the unit and a true minus before a negative number', () => {
    expect(formatQuantity(31.8, 'Hz', en)).toBe(`31.80${GAP}Hz`);
    expect(formatQuantity(-31.8, 'Hz', en)).toBe(`\u221231.80${GAP}Hz`);
  });
  it('writes ohm as U+03A9 and micro as U+00B5', () => {
    expect(formatQuantity(6.21, 'ohm', { ...en, digits: 3 })).toBe(`6.21${GAP}\u03A9`);
    expect(formatQuantity(4.7e-6, 'F', { ...en, digits: 2 })).toBe(`4.7${GAP}\u00B5F`);
  });
  it('follows the locale in the decimal mark', () => {
    expect(formatQuantity(0.0305, 'm³', { locale: 'de', digits: 3 })).toBe(`30,5${GAP}L`);
  });
  it('never shows a minus before a zero', () => {
    expect(formatDecimals(-0.04, 1, 'en')).toBe('0.0');
  });
  it('leaves out zeros that say nothing', () => {
    expect(formatPlain(20_000, 3, 'en')).toBe('20000');
    expect(formatForField(0.165, 'mm', 'de')).toBe('165');
    expect(formatForField(0.1016, 'in', 'en')).toBe('4');
  });
});

describe('a value with its uncertainty', () => {
  it('gives ± as twice the standard uncertainty, to two digits, and the value to the same place', () => {
    const { text, value, plusMinus, standard, k } = formatUncertain({ value: 6.2104, uncertainty: 0.0159 }, 'Ω', en);
    expect(text).toBe(`6.210${GAP}Ω ±${GAP}0.032${GAP}Ω`);
    expect([value, plusMinus, standard, k]).toEqual([`6.210${GAP}Ω`, `±${GAP}0.032${GAP}Ω`, `0.016${GAP}Ω`, 2]);
  });
  it('keeps two digits where rounding adds one: 0.0996 is 0.10', () => {
    expect(formatUncertain({ value: 1, uncertainty: 0.0498 }, '1', en).text).toBe(`1.00 ±${GAP}0.10`);
  });
  it('rounds value and ± to tens where the uncertainty is in hundreds', () => {
    expect(formatUncertain({ value: 4567, uncertainty: 61 }, 'kg/s', en).text).toBe(
      `4570${GAP}kg/s ±${GAP}120${GAP}kg/s`,
    );
  });
  it('uses one unit for both, chosen by the value', () => {
    const vas = { value: 0.03051, uncertainty: 0.00041 };
    expect(formatUncertain(vas, 'm³', en).text).toBe(`30.51${GAP}L ±${GAP}0.82${GAP}L`);
    expect(formatUncertain(vas, 'm³', { ...en, system: 'inch' }).text).toBe(`1.077${GAP}ft³ ±${GAP}0.029${GAP}ft³`);
  });
  it('does not move the zero of a temperature into its uncertainty', () => {
    expect(formatUncertain({ value: 296.15, uncertainty: 0.25 }, 'K', en).text).toBe(
      `23.00${GAP}°C ±${GAP}0.50${GAP}°C`,
    );
  });
  it('shows the value alone where nothing is known of its uncertainty', () => {
    expect(formatUncertain({ value: 31.8 }, 'Hz', en)).toMatchObject({ text: `31.80${GAP}Hz`, plusMinus: '' });
  });
  it('widens by Student t below 30 degrees of freedom', () => {
    expect(formatUncertain({ value: 10, uncertainty: 0.1, dof: 4 }, 'Hz', en).plusMinus).toBe(`±${GAP}0.28${GAP}Hz`);
  });
  it('writes an uneven interval with open ends', () => {
    expect(formatInterval(0.0281, null, 'm³', en)).toBe(`28.1 – ∞${GAP}L`);
  });
});

describe('the coverage factor', () => {
  /** P(|T| < t) by the midpoint rule over the density of Student's t: independent of the table in the code. */
  function coverage(t: number, dof: number): number {
    const steps = 200_000;
    const density = (x: number) => (1 + (x * x) / dof) ** (-(dof + 1) / 2);
    const area = (to: number) => {
      let sum = 0;
      for (let i = 0; i < steps; i += 1) {
        const angle = ((i + 0.5) / steps) * Math.atan(to); // x = tan(angle): the tails become finite
        sum += density(Math.tan(angle)) / Math.cos(angle) ** 2;
      }
      return (sum / steps) * Math.atan(to);
    };
    return area(t) / area(1e9);
  }
  it.each([1, 2, 3, 5, 9, 14, 20, 29])('covers 95 %% with %i degrees of freedom', (dof) => {
    expect(coverage(coverageFactor(dof), dof)).toBeCloseTo(0.95, 4);
  });
  it('is 2 from 30 on, and where the degrees of freedom are not told', () => {
    expect([coverageFactor(30), coverageFactor(580), coverageFactor(undefined)]).toEqual([2, 2, 2]);
  });
  it('takes the whole degrees below a broken number, and one below one', () => {
    expect(coverageFactor(4.9)).toBe(coverageFactor(4));
    expect(coverageFactor(0.5)).toBe(coverageFactor(1));
  });
});
