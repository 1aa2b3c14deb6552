import type { LotAnswer } from '#shared/schemas/lots.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { newestQuotes } from '#server/features/quotes/quote-queries.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { currentFees } from '#server/features/fees/fee-queries.ts';
import { presentLot } from './lot-presenter.ts';
import { findLotDetail } from './lot-queries.ts';

/** The lot as its page needs it, read after whatever was written. Throws `not-found`. */
export async function answerLot(code: string, viewer: Actor | null): Promise<LotAnswer> {
  const detail = await findLotDetail(code, viewer);
  const now = await databaseNow();
  const [board, fees] = await Promise.all([newestQuotes(now), currentFees(now)]);
  return presentLot(detail, { viewer, board, fees, now });
}
