import { METALS } from '#shared/metals.ts';
import { quoteHistoryQuery } from '../features/quotes/api/quote-history-query.ts';
import { QuotesPage } from '../features/quotes/components/quotes-page.tsx';
import { queryClient } from '../lib/query-client.ts';
import { quotesQuery } from '../lib/quotes.ts';

/** The quotes are waited for; the histories follow in their own time. What fails is told in its place. */
export async function loader(): Promise<null> {
  for (const metal of METALS) void queryClient.query(quoteHistoryQuery(metal)).catch(() => null);
  await queryClient.query(quotesQuery).catch(() => null);
  return null;
}

export const Component = QuotesPage;
