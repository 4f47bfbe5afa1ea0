import { lazy, Suspense, useEffect } from 'react';
import { Outlet, ScrollRestoration } from 'react-router-dom';
import { runLatestAction } from '../components/toast-store.js';
import { Toasts } from '../components/toasts.js';
import { useSessionState } from '../lib/session.js';

const SignInAgain = lazy(() =>
  import('../features/account/sign-in-again.js').then(({ SignInAgain: Component }) => ({ default: Component })),
);

/** Ctrl Z outside fields takes the last undoable message back; a screen with its own history stops the event first. */
function undoByKey(event: KeyboardEvent): void {
  const isField = event.target instanceof Element && event.target.closest('input, textarea, select, [contenteditable]');
  if (event.defaultPrevented || isField || event.shiftKey || event.altKey) return;
  if (!(event.ctrlKey || event.metaKey) || event.key.toLowerCase() !== 'z') return;
  if (runLatestAction()) event.preventDefault();
}

export function Root() {
  const { isAsking } = useSessionState();
  useEffect(() => {
    window.addEventListener('keydown', undoByKey);
    return () => window.removeEventListener('keydown', undoByKey);
  }, []);
  return (
    <>
      <Outlet />
      {isAsking && (
        <Suspense fallback={null}>
          <SignInAgain />
        </Suspense>
      )}
      <Toasts />
      <ScrollRestoration />
    </>
  );
}
