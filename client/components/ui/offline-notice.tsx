import { useSyncExternalStore } from 'react';
import { Notice } from './notice.tsx';

function subscribe(onChange: () => void) {
  window.addEventListener('online', onChange);
  window.addEventListener('offline', onChange);
  return () => {
    window.removeEventListener('online', onChange);
    window.removeEventListener('offline', onChange);
  };
}

export function useIsOnline(): boolean {
  return useSyncExternalStore(subscribe, () => navigator.onLine);
}

/** Over a page whose figures may have aged because the connection is gone. */
export function OfflineNotice() {
  if (useIsOnline()) return null;
  return (
    <Notice tone="attention" title="You are offline" role="status" className="no-print mb-6">
      Figures on this page are as last received. What you type stays here; nothing is sent until the
      connection is back.
    </Notice>
  );
}
