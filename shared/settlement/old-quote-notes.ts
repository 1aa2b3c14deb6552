import { groupThousands } from '../money.ts';
import type { AssumedValue, QuoteRef } from './sheet-types.ts';

const MINUTE = 60_000;
/** From here on an age is told in hours, and then in days. */
const HOURS_FROM = 2 * 60;
const DAYS_FROM = 48 * 60;

function ageText(minutes: number): string {
  if (minutes >= DAYS_FROM) return `${Math.floor(minutes / (24 * 60))} days old`;
  if (minutes >= HOURS_FROM) return `${Math.floor(minutes / 60)} hours old`;
  return minutes === 1 ? '1 minute old' : `${minutes} minutes old`;
}

/** '2026-12-01T14:02:30.000Z' gives '2026-12-01, 14:02 UTC': a stored sheet knows no reader's zone. */
function momentText(at: string): string {
  return `${at.slice(0, 10)}, ${at.slice(11, 16)} UTC`;
}

/**
 * A note for each quote that was not fresh when a deal was agreed, so that a stored sheet itself says what it rests on.
 * `isFresh` is the house's judgement of the quote; a closed market is named as the reason. Never throws.
 */
export function oldQuoteNotes(
  quotes: readonly QuoteRef[],
  {
    isFresh,
    isMarketClosed,
    now,
  }: { isFresh: (quote: QuoteRef) => boolean; isMarketClosed: boolean; now: Date },
): AssumedValue[] {
  const why = isMarketClosed ? 'The market was closed at agreement' : 'No fresh quote at agreement';
  return quotes
    .filter((quote) => !isFresh(quote))
    .map((quote) => ({
      field: `/quotes/${quote.metal}`,
      value: `US$ ${groupThousands(quote.usdPerTroyOunce)}/oz t`,
      reason:
        quote.at === null
          ? `${why}: when this quote was made is not known.`
          : `${why}: the quote of ${momentText(quote.at)} was ${ageText(Math.floor((now.getTime() - Date.parse(quote.at)) / MINUTE))}.`,
    }));
}
