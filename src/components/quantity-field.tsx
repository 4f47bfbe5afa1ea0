import { useId, useState } from 'react';
import { displayUnit } from '../../shared/quantities.js';
import { parseQuantity } from '../../shared/quantity-parse.js';
import { formatForField, formatQuantity } from '../../shared/quantity-text.js';
import { text } from '../../shared/text.js';
import { usePreferences } from '../lib/preferences.js';
import { Field, type FieldProps, fieldIds, inputClass } from './field.js';

interface QuantityFieldProps extends FieldProps {
  /** SI unit of `value`; '1' or '' for a pure number. */
  unit: string;
  value: number | undefined;
  onValue: (value: number | undefined) => void;
  /** What counts while the field is empty. */
  presetValue?: number | undefined;
  least?: number | undefined;
  most?: number | undefined;
  isInteger?: boolean;
  isRequired?: boolean;
  disabled?: boolean;
}

/**
 * A number with its unit, written as the person likes: `4u7`, `4,7 µH`, `5 in`. What was understood stands below the
 * field before it counts; it counts when the field is left or Enter is pressed.
 */
export function QuantityField(props: QuantityFieldProps) {
  const { label, hint, error, isOptional, className, unit, value, presetValue, isRequired, disabled } = props;
  const { locale, units } = usePreferences();
  const id = useId();
  const [draft, setDraft] = useState<string>();
  const shown = displayUnit(value ?? presetValue ?? 0, unit, units);
  const language = locale ?? undefined;
  const written = draft ?? (value === undefined ? '' : formatForField(value, shown.symbol, language));
  const { problem, understood } = read(draft, props, shown, language);
  const commit = () => {
    if (draft === undefined || problem) return;
    setDraft(undefined);
    const next = draft.trim() === '' ? undefined : parseQuantity(draft, unit, shown)?.valueSi;
    if (next !== value) props.onValue(next);
  };
  const preset = presetValue === undefined ? '' : formatForField(presetValue, shown.symbol, language);
  const fullHint = understood ?? hint;
  return (
    <Field id={id} {...{ label, isOptional, className }} hint={fullHint} error={problem ?? error}>
      <span className="relative flex items-center">
        <input
          type="text"
          inputMode={unit === '1' || unit === '' ? 'decimal' : 'text'}
          autoComplete="off"
          id={id}
          {...fieldIds(id, { hint: fullHint, error: problem ?? error })}
          required={isRequired}
          disabled={disabled}
          placeholder={preset}
          value={written}
          onChange={(event) => setDraft(event.target.value)}
          onBlur={commit}
          onKeyDown={(event) => {
            if (event.key === 'Enter') commit();
            if (event.key === 'Escape') setDraft(undefined);
          }}
          className={`${inputClass} font-num ${shown.symbol ? 'pe-12' : ''}`}
        />
        {shown.symbol && (
          <span aria-hidden className="pointer-events-none absolute end-3 font-num text-soft">
            {shown.symbol}
          </span>
        )}
      </span>
    </Field>
  );
}

/** What a draft would mean: a problem in words, or how it was understood where that is not plain to see. */
function read(
  draft: string | undefined,
  { unit, least, most, isInteger }: QuantityFieldProps,
  shown: ReturnType<typeof displayUnit>,
  locale: string | undefined,
): { problem?: string; understood?: string } {
  if (draft === undefined || draft.trim() === '') return {};
  const parsed = parseQuantity(draft, unit, shown);
  if (!parsed) return { problem: text.common.notUnderstood(shown.symbol === '' ? '4.7' : `4.7 ${shown.symbol}`) };
  const { valueSi } = parsed;
  const write = (bound: number) => formatQuantity(bound, unit, { locale, unit: shown });
  if (least !== undefined && valueSi < least) return { problem: text.common.atLeast(write(least)) };
  if (most !== undefined && valueSi > most) return { problem: text.common.atMost(write(most)) };
  if (isInteger && !Number.isInteger(valueSi)) return { problem: text.common.wholeNumber };
  const isPlain = /^[\d.,\s]+$/.test(draft);
  return isPlain ? {} : { understood: text.common.understoodAs(formatQuantity(valueSi, unit, { locale })) };
}
