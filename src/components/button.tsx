import { type ComponentPropsWithRef, type MouseEvent, type ReactNode, useId } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from '../lib/class-names.js';

export type ButtonLook = 'primary' | 'plain' | 'quiet' | 'danger';

const LOOKS: Record<ButtonLook, string> = {
  primary: 'bg-heather text-on-heather border-heather hover:brightness-110',
  plain: 'bg-raised text-ink border-edge hover:bg-sunken',
  quiet: 'bg-transparent text-heather border-transparent hover:bg-heather-wash',
  danger: 'bg-raised text-out border-out hover:bg-out-wash',
};

export function buttonClass(look: ButtonLook = 'plain', isIconOnly = false): string {
  return classNames(
    'inline-flex min-h-(--control) items-center justify-center gap-2 rounded-control border font-medium',
    'transition-[background-color,filter] duration-120 select-none',
    'disabled:cursor-default disabled:opacity-60 aria-disabled:cursor-not-allowed aria-disabled:opacity-60',
    isIconOnly ? 'min-w-(--control) px-0' : 'px-3 py-1',
    LOOKS[look],
  );
}

interface ButtonProps extends ComponentPropsWithRef<'button'> {
  look?: ButtonLook;
  icon?: ReactNode;
  /** Only an icon is seen; `aria-label` is then needed. */
  isIconOnly?: boolean;
  isBusy?: boolean;
  /** Why the action cannot be done now and who can do it. The button stays in reach and says so. */
  reason?: string | undefined;
}

export function Button({ look, icon, isIconOnly, isBusy, reason, className, children, onClick, ...rest }: ButtonProps) {
  const reasonId = useId();
  const blocked = isBusy === true || reason !== undefined;
  const press = (event: MouseEvent<HTMLButtonElement>) => {
    if (blocked) event.preventDefault();
    else onClick?.(event);
  };
  return (
    <>
      <button
        type="button"
        {...rest}
        aria-disabled={blocked || undefined}
        aria-busy={isBusy || undefined}
        aria-describedby={reason ? reasonId : rest['aria-describedby']}
        title={reason ?? rest.title}
        className={classNames(buttonClass(look, isIconOnly), className)}
        onClick={press}
      >
        {icon}
        {children}
      </button>
      {reason && (
        <span id={reasonId} className="sr-only">
          {reason}
        </span>
      )}
    </>
  );
}

interface ButtonLinkProps extends LinkProps {
  look?: ButtonLook;
  icon?: ReactNode;
}

export function ButtonLink({ look, icon, className, children, ...rest }: ButtonLinkProps) {
  return (
    <Link {...rest} className={classNames(buttonClass(look), 'no-underline', className)}>
      {icon}
      {children}
    </Link>
  );
}

export function SubmitButton({ isBusy, children }: { isBusy: boolean; children: ReactNode }) {
  return (
    <Button type="submit" look="primary" isBusy={isBusy} className="self-start">
      {children}
    </Button>
  );
}
