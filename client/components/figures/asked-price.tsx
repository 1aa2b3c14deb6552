import type { RegisterRow } from '#shared/schemas/lots.ts';
import { formatDeadline, formatPercent } from '../../lib/format.ts';
import { useReader } from '../../lib/reader-context.ts';
import { useNow } from '../../lib/use-now.ts';
import { Money } from './money.tsx';

type AskedPriceProps = { row: Pick<RegisterRow, 'price' | 'linkedPercent' | 'priceWait'>; bare?: boolean };

/** A sum; or, of a linked lot, its share of melt, and under it what that comes to now or why it waits. */
export function AskedPrice({ row, bare = false }: AskedPriceProps) {
  const { price, linkedPercent, priceWait } = row;
  if (linkedPercent === null) {
    return price && <Money bare={bare} value={price.amount} className="font-medium" />;
  }
  return (
    <>
      <span className="whitespace-nowrap font-medium">linked {formatPercent(linkedPercent)}</span>
      <span className="block text-note text-ink-2">
        {priceWait ? (
          <PriceWaitText wait={priceWait} />
        ) : (
          price && (
            <>
              now <Money bare={bare} value={price.amount} />
            </>
          )
        )}
      </span>
    </>
  );
}

type Wait = NonNullable<RegisterRow['priceWait']>;

/** 'price waits: market closed until Mon 7 Dec, 09:00 UTC', or for which quote it waits. */
export function PriceWaitText({ wait }: { wait: Wait }) {
  const { timeZone } = useReader();
  const now = useNow(30_000);
  if (wait.reason === 'closed') {
    const until = wait.until && formatDeadline(wait.until, timeZone, now).split(' (')[0];
    return <>price waits: market closed{until ? ` until ${until}` : ''}</>;
  }
  return <>price waits for {wait.reason === 'none' ? 'a' : 'a fresh'} quote</>;
}
