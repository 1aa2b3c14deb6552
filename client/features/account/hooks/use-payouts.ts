import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { leaveTo } from '../../../lib/leave-to.ts';
import { sessionQuery } from '../../../lib/session.ts';
import { openPayouts } from '../api/open-payouts.ts';
import { refreshPayouts } from '../api/refresh-payouts.ts';

/** How the member came to the page: back from the provider, with a link that had run out, or by himself. */
export type PayoutsArrival = 'returned' | 'again' | null;

/**
 * Opening goes to the provider by a full navigation. Coming back proves nothing, so the provider is asked once; a link
 * that had run out is replaced once.
 */
export function usePayouts(arrival: PayoutsArrival) {
  const client = useQueryClient();
  const open = useMutation({ mutationFn: openPayouts, onSuccess: ({ url }) => leaveTo(url) });
  const refresh = useMutation({
    mutationFn: refreshPayouts,
    onSuccess: (payouts: MemberAnswer['payouts']) => {
      client.setQueryData(
        sessionQuery.queryKey,
        (session) => session && { ...session, member: session.member && { ...session.member, payouts } },
      );
      return client.invalidateQueries({ queryKey: sessionQuery.queryKey });
    },
  });
  const answered = useRef<PayoutsArrival>(null);
  const { mutate: askProvider } = refresh;
  const { mutate: openAgain } = open;
  useEffect(() => {
    if (answered.current === arrival) return;
    answered.current = arrival;
    if (arrival === 'returned') askProvider();
    if (arrival === 'again') openAgain();
  }, [arrival, askProvider, openAgain]);
  return { open, refresh };
}
