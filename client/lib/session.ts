import { queryOptions, useSuspenseQuery } from '@tanstack/react-query';
import type { MassUnit } from '#shared/mass.ts';
import type { Role } from '#shared/roles.ts';
import { apiGet, rememberCsrfToken } from './api-client.ts';

export type SessionMember = {
  id: string;
  displayName: string;
  email: string;
  role: Role;
  region: string | null;
  massUnit: MassUnit;
  timeZone: string;
  canSell: boolean;
};

export type Session = { csrfToken: string; member: SessionMember | null };

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: async ({ signal }) => {
    const session = await apiGet<Session>('/api/v1/session', { signal });
    rememberCsrfToken(session.csrfToken);
    return session;
  },
  staleTime: 5 * 60_000,
});

export function useSession(): Session {
  return useSuspenseQuery(sessionQuery).data;
}

export function isStaff(member: SessionMember | null): boolean {
  return member?.role === 'desk' || member?.role === 'admin';
}
