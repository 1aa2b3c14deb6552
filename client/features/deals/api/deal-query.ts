import { queryOptions } from '@tanstack/react-query';
import { isDealEnded } from '#shared/deal-states.ts';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { apiGet } from '../../../lib/api-client.ts';

export const dealUrl = (code: string) => `/api/v1/deals/${encodeURIComponent(code)}`;

const POLL_MS = 10_000;

/** Whether something may still happen to a deal without its reader. */
export function isRunning(deal: DealAnswer): boolean {
  if (deal.due !== null) return true;
  return !isDealEnded(deal.state) && deal.payout?.state !== 'paid';
}

/** A deal as its reader may see it; read again while it runs and the page is in view. */
export function dealQuery(code: string) {
  return queryOptions({
    queryKey: ['deals', code],
    queryFn: ({ signal }) => apiGet<DealAnswer>(dealUrl(code), { signal }),
    staleTime: 5_000,
    refetchInterval: ({ state }) => (state.data && isRunning(state.data) ? POLL_MS : false),
  });
}
