import { queryOptions } from '@tanstack/react-query';
import type { FeeScheduleAnswer, LotAnswer, MyLotsAnswer } from '#shared/schemas/lots.ts';
import { apiGet } from './api-client.ts';

export const lotUrl = (code: string) => `/api/v1/lots/${encodeURIComponent(code)}`;

/** A member's own lots in every state. */
export const myLotsQuery = queryOptions({
  queryKey: ['my-lots'],
  queryFn: ({ signal }) => apiGet<MyLotsAnswer>('/api/v1/me/lots', { signal }),
});

/** One own lot with its draft and what may be done with it; shares its place in the cache with the lot page. */
export function ownLotQuery(code: string) {
  return queryOptions({
    queryKey: ['lot', code],
    queryFn: ({ signal }) => apiGet<LotAnswer>(lotUrl(code), { signal }),
  });
}

/** The commission of each payment method that is valid now. */
export const feesQuery = queryOptions({
  queryKey: ['fee-schedule'],
  queryFn: ({ signal }) => apiGet<FeeScheduleAnswer>('/api/v1/fee-schedule', { signal }),
  staleTime: 10 * 60_000,
});
