import { QueryClient } from '@tanstack/react-query';
import { ApiProblem } from './api-client.ts';

/** A refusal is an answer: only what may pass by itself (no network, a server at fault) is asked again. */
function isWorthRetrying(failureCount: number, error: Error): boolean {
  if (error instanceof ApiProblem && error.status < 500) return false;
  return failureCount < 2;
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { staleTime: 30_000, retry: isWorthRetrying },
      mutations: { retry: false },
    },
  });
}

/** The one cache of the running client; loaders prime it, components read it. */
export const queryClient = createQueryClient();
