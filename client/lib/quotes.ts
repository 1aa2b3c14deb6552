import { queryOptions } from '@tanstack/react-query';
import type { QuotesAnswer } from '#shared/schemas/quotes.ts';
import { apiGet } from './api-client.ts';

/** The newest accepted quotes; asked for again every 30 s, no oftener than prices may be announced. */
export const quotesQuery = queryOptions({
  queryKey: ['quotes'],
  queryFn: ({ signal }) => apiGet<QuotesAnswer>('/api/v1/quotes', { signal }),
  staleTime: 20_000,
  refetchInterval: 30_000,
});

/** What can be said of the quotes in one line. */
export type QuoteState =
  | { state: 'fresh'; at: string }
  /** Some metals have a fresh quote, some not. */
  | { state: 'partly'; at: string }
  /** Nothing recent enough was accepted: nothing is priced. */
  | { state: 'stale'; at: string | null }
  /** The market is shut; linked prices wait. */
  | { state: 'closed'; at: string | null; opensAt: string | null };

/** Speaks of the oldest of the quotes that count, so that the line never promises more than holds for every metal. */
export function quoteStateOf(answer: QuotesAnswer): QuoteState {
  const counted = answer.state === 'partly' ? answer.quotes.filter((quote) => quote.isFresh) : answer.quotes;
  const at = counted.map((quote) => quote.at).sort()[0] ?? null;
  if (answer.state === 'closed') return { state: 'closed', at, opensAt: answer.marketUntil };
  if (at === null || answer.state === 'stale' || answer.state === 'none') return { state: 'stale', at };
  return { state: answer.state, at };
}
