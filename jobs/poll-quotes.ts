import { QUOTE_POLL_SECONDS } from '#shared/limits.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { storeReading } from '#server/features/quotes/store-reading.ts';
import { createQuoteClient, QuoteServiceError } from '#server/integrations/quotes.ts';
import { env } from '#server/env.ts';
import { QuotePoll } from '#server/models/quote-poll.ts';
import { defineJob } from './run-job.ts';

type Outcome = QuotePoll['outcome'];

async function recordPoll(
  outcome: Outcome,
  market: { open: boolean | null; until: Date | null },
  detail: Record<string, unknown>,
): Promise<Record<string, unknown>> {
  await withTransaction({}, async ({ tx, now }) => {
    await QuotePoll.create(
      { id: newId(), polledAt: now, outcome, marketOpen: market.open, marketUntil: market.until, detail },
      { transaction: tx },
    );
  });
  return { outcome, ...detail };
}

/** Asks the quote service, then stores metal by metal, each in its own transaction: one bad value does not spoil the others. */
export async function pollQuotes(): Promise<Record<string, unknown>> {
  const client = createQuoteClient({ url: env.QUOTES_URL, apiKey: env.QUOTES_API_KEY });
  let reading;
  try {
    reading = await client.fetchQuotes();
  } catch (error) {
    if (!(error instanceof QuoteServiceError)) throw error;
    const outcome: Outcome = error.reason === 'garbage' ? 'refused' : 'unreachable';
    return recordPoll(outcome, { open: null, until: null }, { reason: error.reason });
  }
  const detail: Record<string, unknown> = {};
  let accepted = 0;
  for (const quote of reading.quotes) {
    if (!quote.ok) {
      detail[quote.metal] = quote.reason;
      continue;
    }
    const verdict = await withTransaction({}, (unit) =>
      storeReading(quote, 'quote service', reading.marketOpen, unit),
    );
    detail[quote.metal] = verdict.kind === 'refuse' ? verdict.reason : verdict.kind;
    if (verdict.kind === 'accept' || verdict.kind === 'known') accepted += 1;
  }
  const outcome: Outcome =
    accepted === reading.quotes.length && accepted > 0 ? 'accepted' : accepted > 0 ? 'partly' : 'refused';
  return recordPoll(outcome, { open: reading.marketOpen, until: reading.marketUntil }, detail);
}

export const pollQuotesJob = defineJob({
  name: 'poll-quotes',
  everySeconds: QUOTE_POLL_SECONDS,
  run: pollQuotes,
});
