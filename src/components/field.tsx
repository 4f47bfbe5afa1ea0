import type { ReactNode } from 'react';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';

export const inputClass = classNames(
  'min-h-(--control) w-full min-w-0 rounded-control border border-edge bg-raised px-3 py-1 text-ink',
  'placeholder:text-soft disabled:opacity-60 aria-invalid:border-out aria-invalid:border-2',
);

export interface FieldProps {
  label: ReactNode;
  /** Said below the field, always. */
  hint?: ReactNode;
  /** What is wrong and what to do; ties itself to the field. */
  error?: string | undefined;
  isOptional?: boolean;
  className?: string;
}

/** The ids by which a field, its hint and its error are tied together. */
export function fieldIds(id: string, { hint, error }: Pick<FieldProps, 'hint' | 'error'>) {
  const describedBy = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ');
  return {
    'aria-describedby': describedBy || undefined,
    'aria-invalid': error ? (true as const) : undefined,
  };
}

/** Label above, then the control, then its hint and its error. */
export function Field({
  id,
  label,
  hint,
  error,
  isOptional,
  className,
  children,
}: FieldProps & { id: string; children: ReactNode }) {
  return (
    <div className={classNames('flex min-w-0 flex-col gap-1', className)}>
      <label htmlFor={id} className="font-medium">
        {label}
        {isOptional && <span className="font-normal text-soft"> ({text.common.optional})</span>}
      </label>
      {children}
      {hint && (
        <p id={`${id}-hint`} className="text-note text-soft">
          {hint}
        </p>
      )}
      {error && (
        <p id={`${id}-error`} className="text-note font-medium text-out">
          <span aria-hidden>▲ </span>
          {error}
        </p>
      )}
    </div>
  );
}
