import { useEffect, useState } from 'react';

/** The present moment in milliseconds, told anew at the given pace; for ages and time left, never for rules. */
export function useNow(everyMs: number): number {
  const [now, setNow] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), everyMs);
    return () => clearInterval(timer);
  }, [everyMs]);
  return now;
}
