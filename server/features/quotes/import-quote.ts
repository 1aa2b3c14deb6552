import type { Metal } from '#shared/metals.ts';
import type { Unit } from '#server/database/transaction.ts';
import { acceptQuote } from './accept-quote.ts';
import { Quote } from '#server/models/quote.ts';

export type ImportedQuote = { metal: Metal; mid: string; at: Date; source: string };

/**
 * Takes over a value of the past that the service itself vouches for, without the gate for live readings: there is nothing
 * to wait for. The same value twice is stored once.
 */
export async function importQuote(input: ImportedQuote, unit: Unit): Promise<void> {
  const { metal, mid, at, source } = input;
  const known = await Quote.count({ where: { metal, quotedAt: at, source }, transaction: unit.tx });
  if (known > 0) return;
  await acceptQuote({ metal, mid, bid: null, ask: null, at, source, acceptedAt: at }, unit);
}
