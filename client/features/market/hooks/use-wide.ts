import { useSyncExternalStore } from 'react';

const QUERY = '(min-width: 70rem)';
const media = () => (typeof window.matchMedia === 'function' ? window.matchMedia(QUERY) : null);

function subscribe(onChange: () => void) {
  const list = media();
  list?.addEventListener('change', onChange);
  return () => list?.removeEventListener('change', onChange);
}

/** Whether the ruled columns of the register fit; where nobody can say, they do. */
export function useWide(): boolean {
  return useSyncExternalStore(subscribe, () => media()?.matches ?? true);
}
