import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, expect, it } from 'vitest';
import { NumberField } from '../../../../src/components/number-field.js';
import { setPreferences } from '../../../../src/lib/preferences.js';

afterEach(() => {
  cleanup();
  setPreferences({ units: 'metric', locale: 'en-GB' });
});

const told: (number | null)[] = [];
function Held({ unit, start, usualValue }: { unit: string; start: number | null; usualValue?: number }) {
  const [value, setValue] = useState(start);
  const onValue = (next: number | null) => {
    told.push(next);
    setValue(next);
  };
  return <NumberField label="Value" {...{ unit, value, onValue }} {...(usualValue ? { usualValue } : {})} />;
}
const field = () => screen.getByLabelText<HTMLInputElement>('Value');

it('reads 4u7 as 4.7 µF and says so before it is stored', async () => {
  render(<Held unit="F" start={null} usualValue={1e-9} />);
  await userEvent.type(field(), '4u7');
  expect(told.at(-1)).toBeCloseTo(4.7e-6, 15);
  expect(screen.getByText(/Understood as 4\.700 µF/)).toBeTruthy();
});

it('takes a bare number in the unit that stands in the field, comma or point', async () => {
  render(<Held unit="kg" start={null} usualValue={0.02} />);
  await userEvent.type(field(), '12,5');
  expect(told.at(-1)).toBeCloseTo(0.0125, 15);
});

it('shows a mass in ounces to a person who chose inch units, and reads it back to the same kilograms', async () => {
  setPreferences({ units: 'inch', locale: 'en-GB' });
  render(<Held unit="kg" start={0.45359237 / 16} />); // one ounce by definition
  expect(field().value).toBe('1');
  await userEvent.clear(field());
  await userEvent.type(field(), '2');
  expect(told.at(-1)).toBeCloseTo(0.45359237 / 8, 12);
});

it('ties the sentence about a number that is none to the field, and tells no value', async () => {
  render(<Held unit="Hz" start={null} />);
  await userEvent.type(field(), 'abc');
  expect(told.at(-1)).toBeNull();
  expect(field().getAttribute('aria-invalid')).toBe('true');
  const error = document.getElementById(field().getAttribute('aria-describedby') ?? '');
  expect(error?.textContent).toContain('Write it like 4.7\u00A0Hz');
});

it('shows a value that arrives from outside in plain digits of the person’s locale', () => {
  setPreferences({ locale: 'de-DE' });
  render(<Held unit="Hz" start={31.25} />);
  expect(field().value).toBe('31,25');
});
