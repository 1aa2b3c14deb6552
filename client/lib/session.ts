import { queryOptions, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import type { MemberAnswer, SessionAnswer } from '#shared/schemas/session.ts';
import { apiGet, rememberCsrfToken } from './api-client.ts';

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: async ({ signal }) => {
    const session = await apiGet<SessionAnswer>('/api/v1/session', { signal });
    rememberCsrfToken(session.csrfToken);
    return session;
  },
  staleTime: 5 * 60_000,
});

/** Takes over the session that signing in, signing up or a changed profile answered. */
export function adoptSession(client: QueryClient, session: SessionAnswer): void {
  rememberCsrfToken(session.csrfToken);
  client.setQueryData(sessionQuery.queryKey, session);
}

/** Who is signed in; under a route of the layout the answer is already here. */
export function useSession(): SessionAnswer {
  return useSuspenseQuery(sessionQuery).data;
}

export function useMember(): MemberAnswer | null {
  return useSession().member;
}
