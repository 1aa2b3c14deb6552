import type { Metal } from '#shared/metals.ts';
import type { PriceWait } from '#shared/schemas/lots.ts';
import type { QuoteBoard } from './quote-queries.ts';

/**
 * Why a price that is linked to these metals cannot be fixed now, or null when it can: a closed market comes first, because
 * it says until when; then a metal that has no quote at all, then one whose quote is not fresh.
 */
export function priceWaitOf(board: QuoteBoard, metals: readonly Metal[]): PriceWait | null {
  if (board.state === 'closed') {
    return { reason: 'closed', until: board.marketUntil?.toISOString() ?? null };
  }
  const quotes = metals.map((metal) => board.byMetal[metal]);
  if (quotes.some((quote) => quote === undefined)) return { reason: 'none', until: null };
  return quotes.every((quote) => quote?.isFresh) ? null : { reason: 'stale', until: null };
}
