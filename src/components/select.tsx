import { type ComponentPropsWithRef, useId } from 'react';
import { classNames } from '../lib/class-names.js';
import { Field, type FieldProps, fieldIds, inputClass } from './field.js';

export interface SelectOption<Value extends string> {
  value: Value;
  label: string;
}
interface SelectProps<Value extends string>
  extends FieldProps,
    Omit<ComponentPropsWithRef<'select'>, 'className' | 'value' | 'onChange'> {
  options: readonly SelectOption<Value>[];
  value: Value;
  onValue: (value: Value) => void;
}

/** The browser's own list: works by touch, keys and screen reader everywhere. */
export function Select<Value extends string>({
  label,
  hint,
  error,
  isOptional,
  className,
  options,
  value,
  onValue,
  id: givenId,
  ...rest
}: SelectProps<Value>) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const choose = (chosen: string) => {
    const option = options.find((candidate) => candidate.value === chosen);
    if (option) onValue(option.value);
  };
  return (
    <Field id={id} {...{ label, hint, isOptional, className }} error={error}>
      <select
        id={id}
        {...fieldIds(id, { hint, error })}
        {...rest}
        value={value}
        onChange={(event) => choose(event.target.value)}
        className={classNames(inputClass, 'pe-2')}
      >
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </Field>
  );
}
