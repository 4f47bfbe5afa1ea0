import { Eye, EyeOff } from 'lucide-react';
import { type ComponentPropsWithRef, useId, useState } from 'react';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { Button } from './button.js';
import { Field, type FieldProps, fieldIds, inputClass } from './field.js';

type PasswordFieldProps = FieldProps & Omit<ComponentPropsWithRef<'input'>, 'className' | 'type'>;

/** Paste and password managers work; the password can be shown. */
export function PasswordField({ label, hint, error, isOptional, className, id: givenId, ...rest }: PasswordFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const [isShown, setIsShown] = useState(false);
  return (
    <Field id={id} {...{ label, hint, isOptional, className }} error={error}>
      <div className="relative">
        <input
          id={id}
          {...fieldIds(id, { hint, error })}
          {...rest}
          type={isShown ? 'text' : 'password'}
          autoCapitalize="off"
          spellCheck={false}
          className={classNames(inputClass, 'pe-12')}
        />
        <Button
          look="quiet"
          isIconOnly
          className="absolute inset-y-0 end-0"
          icon={isShown ? <EyeOff size={18} aria-hidden /> : <Eye size={18} aria-hidden />}
          aria-label={isShown ? text.common.hidePassword : text.common.showPassword}
          aria-pressed={isShown}
          onClick={() => setIsShown(!isShown)}
        />
      </div>
    </Field>
  );
}
