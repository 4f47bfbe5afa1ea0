import { useSyncExternalStore } from 'react';
import { text } from '../../shared/text.js';

function subscribe(listener: () => void): () => void {
  window.addEventListener('online', listener);
  window.addEventListener('offline', listener);
  return () => {
    window.removeEventListener('online', listener);
    window.removeEventListener('offline', listener);
  };
}
export function useIsOnline(): boolean {
  return useSyncExternalStore(subscribe, () => navigator.onLine);
}

export function OfflineBar() {
  const isOnline = useIsOnline();
  return (
    <div role="status">
      {!isOnline && <p className="bg-old-wash px-4 py-1 text-center text-old">{text.common.offline}</p>}
    </div>
  );
}
