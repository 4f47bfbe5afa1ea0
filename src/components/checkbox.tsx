import { type ComponentPropsWithRef, type ReactNode, useId } from 'react';

interface CheckboxProps extends Omit<ComponentPropsWithRef<'input'>, 'className'> {
  label: ReactNode;
  hint?: ReactNode;
}

export function Checkbox({ label, hint, ...rest }: CheckboxProps) {
  const hintId = useId();
  return (
    <div className="flex flex-col">
      <label className="inline-flex min-h-(--control) items-center gap-2">
        <input
          type="checkbox"
          aria-describedby={hint ? hintId : undefined}
          {...rest}
          className="size-5 shrink-0 accent-heather"
        />
        <span>{label}</span>
      </label>
      {hint && (
        <p id={hintId} className="ps-7 text-note text-soft">
          {hint}
        </p>
      )}
    </div>
  );
}
