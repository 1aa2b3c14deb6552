import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type { SessionAnswer } from '#shared/schemas/session.ts';
import { adoptSession, sessionQuery } from '../../../lib/session.ts';

/** Takes over the new session, forgets what was read as somebody else, and goes to where the member was heading. */
export function useEnter(next: string) {
  const client = useQueryClient();
  const navigate = useNavigate();
  return async (session: SessionAnswer) => {
    client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionQuery.queryKey[0] });
    adoptSession(client, session);
    await navigate(next, { replace: true });
  };
}
