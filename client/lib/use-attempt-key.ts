import { useCallback, useMemo, useRef } from 'react';
import { ApiProblem, newIdempotencyKey } from './api-client.ts';

/**
 * One key for one intended act: the same request sent again after a lost connection carries the same key, so that it
 * acts once. A changed request, or a refusal that is final, begins a new attempt.
 */
export function useAttemptKey() {
  const attempt = useRef<{ request: string; key: string } | null>(null);
  const keyFor = useCallback((request: unknown) => {
    const text = JSON.stringify(request);
    if (attempt.current?.request !== text) attempt.current = { request: text, key: newIdempotencyKey() };
    return attempt.current.key;
  }, []);
  const settle = useCallback((error: unknown) => {
    if (error instanceof ApiProblem && error.status < 500) attempt.current = null;
  }, []);
  return useMemo(() => ({ keyFor, settle }), [keyFor, settle]);
}
