import { useCallback, useEffect, useState } from 'react';

function readKept<T>(key: string, isShape: (value: unknown) => value is T): T | null {
  try {
    const value: unknown = JSON.parse(window.sessionStorage.getItem(key) ?? 'null');
    return isShape(value) ? value : null;
  } catch {
    return null;
  }
}

/** State that outlives a reload or a detour to the sign-in page, in this tab only. */
export function useKeptState<T>(key: string, initial: T, isShape: (value: unknown) => value is T) {
  const [state, setState] = useState(() => readKept(key, isShape) ?? initial);
  useEffect(() => {
    try {
      window.sessionStorage.setItem(key, JSON.stringify(state));
    } catch {
      // Without storage the page still works; only a reload forgets.
    }
  }, [key, state]);
  const forget = useCallback(() => {
    try {
      window.sessionStorage.removeItem(key);
    } catch {
      // Nothing was kept.
    }
  }, [key]);
  return [state, setState, forget] as const;
}
