import { type ComponentPropsWithRef, useId, useState } from 'react';
import { displayUnit, type Unit } from '../../shared/quantities.js';
import { parseQuantity } from '../../shared/quantity-parse.js';
import { formatForField, formatQuantity } from '../../shared/quantity-text.js';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { usePreferences } from '../lib/preferences.js';
import { Field, type FieldProps, fieldIds, inputClass } from './field.js';

interface NumberFieldProps
  extends FieldProps,
    Omit<ComponentPropsWithRef<'input'>, 'className' | 'value' | 'onChange' | 'onBlur'> {
  /** SI unit of the value; '1' or '' for a pure number. */
  unit: string;
  /** SI; null while there is none. */
  value: number | null;
  /** Told at every change: the number in SI, or null where the field is empty or not understood. */
  onValue: (valueSi: number | null) => void;
  /** Of the size that is usual here, SI: decides the unit of an empty field. */
  usualValue?: number;
}

/** A number with a unit, written as people write it (4u7, 4.7µ, 4,7 uH); says what it understood before it is stored. */
export function NumberField(props: NumberFieldProps) {
  const { label, hint, error, isOptional, className, id: givenId, unit, value, onValue, usualValue, ...rest } = props;
  const ownId = useId();
  const id = givenId ?? ownId;
  const { units, locale } = usePreferences();
  const format = { system: units, locale: locale ?? undefined };
  const shown = useShownUnit(value, usualValue, unit, units);
  const plain = value === null ? '' : formatForField(value, shown.symbol, format.locale);
  const [draft, setDraft] = useState<string>();
  const parsed = draft === undefined || draft.trim() === '' ? null : parseQuantity(draft, unit, shown, format.locale);
  const isOdd = draft !== undefined && draft.trim() !== '' && parsed === null;
  const isRewritten = parsed !== null && parsed.unit.symbol !== shown.symbol;
  const understood =
    isRewritten && parsed ? text.common.understoodAs(formatQuantity(parsed.valueSi, unit, format)) : '';
  const said = isOdd ? text.common.notUnderstood(exampleFor(shown)) : error;
  return (
    <Field id={id} {...{ label, isOptional, className }} hint={understood || hint} error={said}>
      <div className="relative">
        <input
          id={id}
          type="text"
          inputMode="decimal"
          autoComplete="off"
          {...fieldIds(id, { hint: understood || hint, error: said })}
          {...rest}
          value={draft ?? plain}
          onChange={(event) => {
            setDraft(event.target.value);
            onValue(parseQuantity(event.target.value, unit, shown, format.locale)?.valueSi ?? null);
          }}
          onBlur={() => {
            if (!isOdd) setDraft(undefined);
          }}
          className={classNames(inputClass, 'font-num', shown.symbol && 'pe-14')}
        />
        {shown.symbol && (
          <span aria-hidden className="pointer-events-none absolute inset-y-0 end-3 flex items-center text-soft">
            {shown.symbol}
          </span>
        )}
      </div>
    </Field>
  );
}

function exampleFor({ symbol }: Unit): string {
  return symbol === '' ? '4.7' : `4.7\u00A0${symbol}`;
}

/** The unit stays while a person writes; it follows a value that comes from outside, and the choice of units. */
function useShownUnit(value: number | null, usual: number | undefined, si: string, system: 'metric' | 'inch'): Unit {
  const fresh = displayUnit(usual ?? value ?? 0, si, system);
  const [kept, setKept] = useState({ unit: fresh, si, system });
  if (kept.si === si && kept.system === system) return kept.unit;
  setKept({ unit: fresh, si, system });
  return fresh;
}
