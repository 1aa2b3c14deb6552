import { queryOptions } from '@tanstack/react-query';
import type { Metal } from '#shared/metals.ts';
import type { QuoteHistoryAnswer } from '#shared/schemas/quotes.ts';
import { apiGet } from '../../../lib/api-client.ts';

export const HISTORY_DAYS = 60;

/** The first accepted quote of each of the last sixty days. */
export function quoteHistoryQuery(metal: Metal) {
  return queryOptions({
    queryKey: ['quotes', 'history', metal],
    queryFn: ({ signal }) =>
      apiGet<QuoteHistoryAnswer>(`/api/v1/quotes/history?metal=${metal}&days=${HISTORY_DAYS}`, { signal }),
    staleTime: 10 * 60_000,
  });
}
