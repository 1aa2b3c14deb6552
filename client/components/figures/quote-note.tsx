import { Link } from 'react-router-dom';
import { formatAge, formatClock, formatDeadline } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import type { QuoteState } from '../../lib/quotes.ts';
import { useReader } from '../../lib/reader-context.ts';
import { useNow } from '../../lib/use-now.ts';

/** 'quote 14:02, 40 s', or plainly that there is none. */
export function quoteText(quote: QuoteState, timeZone: string, nowMs: number): string {
  if (quote.state === 'fresh')
    return `quote ${formatClock(quote.at, timeZone)}, ${formatAge(quote.at, nowMs)}`;
  if (quote.state === 'partly') return `some quotes stale, others ${formatClock(quote.at, timeZone)}`;
  if (quote.state === 'closed') {
    if (quote.opensAt)
      return `market closed until ${formatDeadline(quote.opensAt, timeZone, nowMs).split(' (')[0]}`;
    return 'market closed';
  }
  return quote.at ? `no fresh quote since ${formatClock(quote.at, timeZone)}` : 'no fresh quote';
}

type QuoteNoteProps = { quote: QuoteState };

/** The header's word on the quote; leads to the page of quotes. It ages quietly: what changes it is told elsewhere. */
export function QuoteNote({ quote }: QuoteNoteProps) {
  const { timeZone } = useReader();
  const now = useNow(5_000);
  const isFresh = quote.state === 'fresh';
  return (
    <Link
      to={paths.quotes()}
      className={`inline-block py-1.5 text-note hover:underline ${isFresh ? 'text-ink-2' : 'font-medium text-litharge'}`}
    >
      {quoteText(quote, timeZone, now)}
    </Link>
  );
}
