import { useState } from 'react';
import { formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { NumberField } from '../../components/number-field.js';
import { usePreferences } from '../../lib/preferences.js';

interface BoundedNumberFieldProps {
  label: string;
  hint?: string;
  unit: string; // SI
  value: number | undefined;
  onValue: (value: number | undefined) => void;
  /** What counts while the field is empty. */
  preset?: number | undefined;
  least?: number | undefined;
  most?: number | undefined;
  isInteger?: boolean;
}

/** A number with a unit that has to lie in a range: one outside it is said at the field and not taken. */
export function BoundedNumberField({
  value,
  onValue,
  preset,
  least,
  most,
  isInteger,
  ...rest
}: BoundedNumberFieldProps) {
  const { units, locale } = usePreferences();
  const [problem, setProblem] = useState<string>();
  const format = { system: units, locale: locale ?? undefined, digits: 3 };
  const write = (bound: number) => formatQuantity(bound, rest.unit, format);
  const take = (next: number | null) => {
    const refused = next === null ? undefined : refusal(next, { least, most, isInteger: isInteger ?? false }, write);
    setProblem(refused);
    if (refused === undefined) onValue(next ?? undefined);
  };
  return (
    <NumberField
      {...rest}
      value={value ?? null}
      onValue={take}
      error={problem}
      {...(preset === undefined ? {} : { usualValue: preset, placeholder: write(preset) })}
    />
  );
}

function refusal(
  value: number,
  { least, most, isInteger }: { least: number | undefined; most: number | undefined; isInteger: boolean },
  write: (bound: number) => string,
): string | undefined {
  if (least !== undefined && value < least) return text.common.atLeast(write(least));
  if (most !== undefined && value > most) return text.common.atMost(write(most));
  return isInteger && !Number.isInteger(value) ? text.common.wholeNumber : undefined;
}
