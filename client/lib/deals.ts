import { queryOptions } from '@tanstack/react-query';
import type { DealAnswer, DealsAnswer } from '#shared/schemas/deals.ts';
import { apiGet } from './api-client.ts';

export const dealUrl = (code: string) => `/api/v1/deals/${encodeURIComponent(code)}`;

const DEAL_POLL_MS = 10_000;
const LIST_POLL_MS = 30_000;
const ENDED: readonly DealAnswer['state'][] = ['lapsed', 'cancelled', 'returned', 'reversed'];

/** Whether something may still happen to a deal without its reader; decides only how often it is looked at. */
function isRunning(deal: DealAnswer): boolean {
  if (deal.due !== null) return true;
  return !ENDED.includes(deal.state) && deal.payout?.state !== 'paid';
}

/** A deal as its reader may see it; read again while it runs and the page is in view. */
export function dealQuery(code: string) {
  return queryOptions({
    queryKey: ['deals', code],
    queryFn: ({ signal }) => apiGet<DealAnswer>(dealUrl(code), { signal }),
    staleTime: 5_000,
    refetchInterval: ({ state }) => (state.data && isRunning(state.data) ? DEAL_POLL_MS : false),
  });
}

/** Where the member stands; read again while something runs and the page is in view. */
export const dealsQuery = queryOptions({
  queryKey: ['deals', 'list'],
  queryFn: ({ signal }) => apiGet<DealsAnswer>('/api/v1/deals', { signal }),
  staleTime: 5_000,
  refetchInterval: ({ state }) =>
    state.data && state.data.toDo.length + state.data.running.length > 0 ? LIST_POLL_MS : false,
});
