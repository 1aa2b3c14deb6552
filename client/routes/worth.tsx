import { WorthPage } from '../features/worth/components/worth-page.tsx';
import { queryClient } from '../lib/query-client.ts';
import { quotesQuery } from '../lib/quotes.ts';

/** Without a quote the page still works: the reader can write one. */
export async function loader(): Promise<null> {
  await queryClient.query(quotesQuery).catch(() => null);
  return null;
}

export const Component = WorthPage;
