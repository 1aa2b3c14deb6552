import { useQuery } from '@tanstack/react-query';
import { QuoteNote } from '../components/figures/quote-note.tsx';
import { paths } from '../lib/paths.ts';
import { quotesQuery, quoteStateOf } from '../lib/quotes.ts';
import { isRouted } from './routes.tsx';

/** The header's word on the quotes; without an answer it says nothing rather than something old. */
export function HeaderQuote() {
  const hasPage = isRouted(paths.quotes());
  const { data } = useQuery({ ...quotesQuery, enabled: hasPage });
  if (!hasPage || !data) return null;
  return <QuoteNote quote={quoteStateOf(data)} />;
}
