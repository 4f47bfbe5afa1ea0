import { X } from 'lucide-react';
import { type ReactNode, useEffect, useId, useRef } from 'react';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { Button } from './button.js';

interface DialogProps {
  title: ReactNode;
  onClose: () => void;
  children: ReactNode;
  /** Buttons at the foot. */
  actions?: ReactNode;
  isWide?: boolean;
  /** Nearly the whole window, for a screen over a screen. */
  isFull?: boolean;
  /** No way out but its own buttons, for a question that has to be answered. */
  isHeld?: boolean;
}

/** The browser's modal dialog: it keeps the focus, gives it back, and closes on Esc. Rendered means open. */
export function Dialog({ title, onClose, children, actions, isWide, isFull, isHeld }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const element = dialog.current;
    if (element && !element.open) element.showModal();
    return () => element?.close();
  }, []);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        if (!isHeld) onClose();
      }}
      className={classNames(
        'max-h-[calc(100dvh-2rem)] w-[calc(100vw-2rem)] animate-rise overflow-y-auto rounded-sheet bg-raised p-6 shadow-lift',
        'border border-edge backdrop:bg-ink/40 dark:backdrop:bg-sunken/70',
        isFull ? 'max-w-none' : isWide ? 'max-w-4xl' : 'max-w-lg',
      )}
    >
      <div className="mb-4 flex items-start justify-between gap-4">
        <h2 id={titleId} className="text-title">
          {title}
        </h2>
        {!isHeld && (
          <Button
            look="quiet"
            isIconOnly
            icon={<X size={20} aria-hidden />}
            aria-label={text.common.close}
            onClick={onClose}
          />
        )}
      </div>
      {children}
      {actions && <div className="mt-6 flex flex-wrap justify-end gap-2">{actions}</div>}
    </dialog>
  );
}
