/** Keeps the pages for times without a connection; the built product only, as a development server has no build. */
export function keepPagesOffline(): void {
  if (!import.meta.env.PROD || !('serviceWorker' in navigator)) return;
  window.addEventListener('load', () => {
    navigator.serviceWorker.register('/service-worker.js', { type: 'module' }).catch(() => {
      // a private window may refuse it; the product then needs its connection
    });
  });
}
