import { X } from 'lucide-react';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { Button } from './button.js';
import { closeToast, holdToasts, releaseToasts, type Toast, useToasts } from './toast-store.js';

/** The corner where short messages appear; read out politely, reachable by Tab. Stands once, at the root. */
export function Toasts() {
  const toasts = useToasts();
  return (
    <section
      aria-label={text.common.notices}
      onPointerEnter={holdToasts}
      onPointerLeave={releaseToasts}
      onFocus={holdToasts}
      onBlur={releaseToasts}
      className="pointer-events-none fixed inset-x-4 bottom-4 z-40 flex flex-col items-end gap-2"
    >
      <div role="status" aria-live="polite" className="contents">
        {toasts.map((toast) => (
          <ToastCard key={toast.id} toast={toast} />
        ))}
      </div>
    </section>
  );
}

function ToastCard({ toast }: { toast: Toast }) {
  const { id, message, tone, action } = toast;
  const act = () => {
    action?.run();
    closeToast(id);
  };
  return (
    <div
      className={classNames(
        'pointer-events-auto flex max-w-md animate-rise items-center gap-3 rounded-control border bg-raised py-1 ps-4 pe-1 shadow-lift',
        tone === 'fault' ? 'border-out' : 'border-edge',
      )}
    >
      <p className="flex-1 py-1">
        {tone === 'fault' && (
          <span aria-hidden className="text-out">
            ▲{' '}
          </span>
        )}
        {message}
      </p>
      {action && (
        <Button look="quiet" onClick={act}>
          {action.label}
        </Button>
      )}
      <Button
        look="quiet"
        isIconOnly
        icon={<X size={18} aria-hidden />}
        aria-label={text.common.close}
        onClick={() => closeToast(id)}
      />
    </div>
  );
}
