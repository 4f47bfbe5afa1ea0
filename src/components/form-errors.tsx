import { useEffect, useRef } from 'react';
import type { FieldErrors, FieldValues } from 'react-hook-form';
import { text } from '../../shared/text.js';

interface FormErrorsProps<Values extends FieldValues> {
  errors: FieldErrors<Values>;
  /** How each field is called on the screen; a link leads to the field of that name. */
  labels: Partial<Record<keyof Values & string, string>>;
  /** Counts the tries: an error of the whole form takes the focus after each; one of a field leaves it to the field. */
  tries: number;
}

/** What is still needed, listed on top of a form with links to the fields. */
export function FormErrors<Values extends FieldValues>({ errors, labels, tries }: FormErrorsProps<Values>) {
  const list = useRef<HTMLDivElement>(null);
  const found = Object.entries(labels).flatMap(([name, label]) => {
    const message = errors[name]?.message;
    return typeof message === 'string' ? [{ name, label, message }] : [];
  });
  const whole = errors.root?.message;
  useEffect(() => {
    if (tries > 0 && whole) list.current?.focus();
  }, [tries, whole]);
  if (found.length === 0 && !whole) return null;
  return (
    <div ref={list} role="alert" tabIndex={-1} className="border-s-4 border-out bg-out-wash px-4 py-3">
      {found.length > 0 && <p className="font-semibold">{text.common.listedErrors(found.length)}</p>}
      {whole && <p className="font-semibold">{whole}</p>}
      <ul>
        {found.map(({ name, label, message }) => (
          <li key={name}>
            <a
              href={`#${name}`}
              className="text-out underline"
              onClick={(event) => {
                event.preventDefault();
                document.getElementById(name)?.focus();
              }}
            >
              {label as string}: {message}
            </a>
          </li>
        ))}
      </ul>
    </div>
  );
}
