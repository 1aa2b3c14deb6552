import { useQuery } from '@tanstack/react-query';
import { MASS_UNIT_LABELS } from '#shared/mass.ts';
import { METAL_NAMES, METALS, type Metal } from '#shared/metals.ts';
import type { QuoteAnswer, QuotesAnswer } from '#shared/schemas/quotes.ts';
import { MetalSwatch } from '../../../components/figures/metal-pattern.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { readingUnits } from '../../../components/figures/mass-conversion.ts';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { Age, Deadline, Time } from '../../../components/ui/time.tsx';
import { quotesQuery } from '../../../lib/quotes.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { pricePerUnit } from '../../../lib/shown-figures.ts';
import { QuoteHistory } from './quote-history.tsx';

/** What each metal is quoted at, since when and by whom, and how it got there. */
export function QuotesPage() {
  const { data, error, isPending, refetch } = useQuery(quotesQuery);
  return (
    <Page
      title="Quotes"
      sub="US dollars for fine metal; the middle of the newest accepted quote. What is worth something here is computed from these."
    >
      <OfflineNotice />
      {isPending && <Skeleton lines={8} label="Loading the quotes" />}
      {!isPending && !data && <ErrorState error={error} what="The quotes" onRetry={() => refetch()} />}
      {data && (
        <>
          <StateNotice answer={data} />
          {METALS.map((metal) => (
            <MetalQuote
              key={metal}
              metal={metal}
              quote={data.quotes.find((quote) => quote.metal === metal)}
              state={data.state}
            />
          ))}
          <p className="mt-6 max-w-prose text-note text-ink-2">
            A quote is asked for every minute. One that is older than{' '}
            {Math.floor(data.staleAfterSeconds / 60)} minutes counts as stale; one that jumps is set aside
            until the following ones confirm it.
          </p>
        </>
      )}
    </Page>
  );
}

function StateNotice({ answer }: { answer: QuotesAnswer }) {
  if (answer.state === 'fresh') return null;
  if (answer.state === 'closed')
    return (
      <Notice role="status" title="The market is closed" className="mb-5">
        The last quotes stand
        {answer.marketUntil && (
          <>
            ; it opens again <Deadline at={answer.marketUntil} />
          </>
        )}
        .
      </Notice>
    );
  const words = {
    none: ['There is no quote', 'None has been accepted yet, so nothing can be valued.'],
    stale: ['There is no fresh quote', 'What stands below is old; nothing says what the metal is worth now.'],
    partly: ['Some quotes are stale', 'Look at the time beside each metal.'],
  } as const;
  const [title, text] = words[answer.state];
  return (
    <Notice tone="attention" role="status" title={title} className="mb-5">
      {text}
    </Notice>
  );
}

type MetalQuoteProps = { metal: Metal; quote: QuoteAnswer | undefined; state: QuotesAnswer['state'] };

function MetalQuote({ metal, quote, state }: MetalQuoteProps) {
  return (
    <section
      aria-labelledby={`quote-${metal}`}
      className="grid grid-cols-[minmax(0,1fr)] gap-x-10 gap-y-4 border-t border-rule py-6 md:grid-cols-[17rem_minmax(0,1fr)]"
    >
      <div>
        <h2 id={`quote-${metal}`} className="flex items-center gap-3">
          <MetalSwatch metal={metal} />
          {METAL_NAMES[metal]} <span className="font-normal text-ink-2">{metal}</span>
        </h2>
        {quote ? (
          <QuoteFigures quote={quote} isMarketClosed={state === 'closed'} />
        ) : (
          <p className="mt-2 text-ink-2">No quote has been accepted yet.</p>
        )}
      </div>
      <QuoteHistory metal={metal} />
    </section>
  );
}

function standing(quote: QuoteAnswer, isMarketClosed: boolean): string | null {
  if (quote.isQuarantined)
    return 'A newer value jumped and is set aside until it is confirmed; this is the last accepted one.';
  if (isMarketClosed) return 'The market is closed; this is its last value.';
  return quote.isFresh ? null : 'Stale: too old to say what the metal is worth now.';
}

function QuoteFigures({ quote, isMarketClosed }: { quote: QuoteAnswer; isMarketClosed: boolean }) {
  const { weightUnit } = useReader();
  const [first, ...others] = readingUnits(weightUnit);
  const said = standing(quote, isMarketClosed);
  return (
    <>
      <p className="mt-2 text-title">
        <Money value={pricePerUnit(quote.usdPerTroyOunce, first ?? 'g')} />{' '}
        <span className="unit">per {MASS_UNIT_LABELS[first ?? 'g']}</span>
      </p>
      <ul className="mt-1 text-note text-ink-2">
        {others.map((unit) => (
          <li key={unit}>
            <Money value={pricePerUnit(quote.usdPerTroyOunce, unit)} /> per {MASS_UNIT_LABELS[unit]}
          </li>
        ))}
      </ul>
      <p className="mt-3 text-note">
        Quote of <Time at={quote.at} />, <Age at={quote.at} /> ago
        <span className="block text-ink-2">from {quote.source}</span>
      </p>
      {said && <p className="mt-2 text-note font-medium text-litharge">{said}</p>}
    </>
  );
}
