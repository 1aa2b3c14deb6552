import { withTransaction } from '#server/database/transaction.ts';
import { importQuote } from '#server/features/quotes/import-quote.ts';
import type { HistoricQuote } from '#server/integrations/quotes.ts';

/** Takes over values that the service vouches for, in one transaction: hundreds of small ones would take longer than the story. */
export async function importQuotes(
  quotes: readonly Pick<HistoricQuote, 'metal' | 'mid' | 'at'>[],
): Promise<void> {
  await withTransaction({}, async (unit) => {
    for (const { metal, mid, at } of quotes) {
      await importQuote({ metal, mid, at, source: 'quote service' }, unit);
    }
  });
}
