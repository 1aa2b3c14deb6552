import type { Metal } from '#shared/metals.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { DayRate } from '#server/models/day-rate.ts';
import { Quote } from '#server/models/quote.ts';

export type AcceptedReading = {
  metal: Metal;
  mid: string;
  bid: string | null;
  ask: string | null;
  at: Date;
  source: string;
  acceptedAt: Date;
};

/** The day's first accepted quote of a metal ranks the register until tomorrow; the UNIQUE key keeps it the first. */
async function keepDayRate(quote: Quote, unit: Unit): Promise<void> {
  const day = quote.acceptedAt.toISOString().slice(0, 10);
  const known = await DayRate.count({ where: { metal: quote.metal, day }, transaction: unit.tx });
  if (known > 0) return;
  await DayRate.create(
    { id: newId(), metal: quote.metal, day, quoteId: quote.id, usdPerTroyOunce: quote.usdPerTroyOunce },
    { transaction: unit.tx },
  );
}

/** Writes a quote that nothing speaks against, and the day's rate where it is the day's first. */
export async function acceptQuote(reading: AcceptedReading, unit: Unit): Promise<Quote> {
  const quote = await Quote.create(
    {
      id: newId(),
      metal: reading.metal,
      usdPerTroyOunce: reading.mid,
      bid: reading.bid,
      ask: reading.ask,
      source: reading.source,
      quotedAt: reading.at,
      acceptedAt: reading.acceptedAt,
    },
    { transaction: unit.tx },
  );
  await keepDayRate(quote, unit);
  return quote;
}
