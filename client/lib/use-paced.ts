import { useEffect, useState } from 'react';

/** A value that is announced: it follows only after it has stood still for `pauseMs`, so that typing is not read out. */
export function usePaced<T extends string | null>(value: T, pauseMs: number): T {
  const [paced, setPaced] = useState(value);
  useEffect(() => {
    if (paced === value) return;
    const timer = setTimeout(() => setPaced(value), pauseMs);
    return () => clearTimeout(timer);
  }, [value, paced, pauseMs]);
  return paced;
}
