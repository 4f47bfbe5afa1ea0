import { type ComponentPropsWithRef, useId } from 'react';
import { Field, type FieldProps, fieldIds, inputClass } from './field.js';

type TextFieldProps = FieldProps & Omit<ComponentPropsWithRef<'input'>, 'className'>;

export function TextField({ label, hint, error, isOptional, className, id: givenId, ...rest }: TextFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <Field id={id} {...{ label, hint, isOptional, className }} error={error}>
      <input type="text" id={id} {...fieldIds(id, { hint, error })} {...rest} className={inputClass} />
    </Field>
  );
}

type TextAreaProps = FieldProps & Omit<ComponentPropsWithRef<'textarea'>, 'className'>;

export function TextArea({ label, hint, error, isOptional, className, id: givenId, ...rest }: TextAreaProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <Field id={id} {...{ label, hint, isOptional, className }} error={error}>
      <textarea id={id} rows={3} {...fieldIds(id, { hint, error })} {...rest} className={inputClass} />
    </Field>
  );
}
