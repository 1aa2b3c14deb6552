import { checkPrice } from '#shared/lot-submission.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import { ConflictError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import { orRefuse } from '#server/refused.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { recordLotEvent } from './move-lot.ts';
import { readOwnLot } from './own-lot.ts';
import { rankColumnsOf } from '#server/features/register/rank-lot.ts';

/**
 * Changes the price of an open lot and its ranking key with it; never of a reserved one, whose buyer has agreed. The same
 * price again changes nothing. Expects the lot's lock, which a purchase takes too.
 * Throws `not-found`, `forbidden`, `member-suspended`, `invalid-input` at `/price`, `illegal-transition`.
 */
export async function changePrice(
  { lotId, price }: { lotId: string; price: string },
  unit: Unit,
  actor: Actor,
): Promise<Lot> {
  const priceMinor = orRefuse(() => {
    const { minor } = fromAmount(price, '/price');
    checkPrice(minor);
    return minor;
  });
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'open') {
    throw new ConflictError('illegal-transition', 'The price can change only while the lot is open.');
  }
  const { priceMinor: before } = lot;
  invariant(before !== null, 'an open lot has a price');
  if (before === priceMinor) return lot;
  const ranks = await rankColumnsOf(lot, { grade: lot.evidenceGrade, priceMinor }, unit);
  const detail = { from: minorToAmount(before), to: minorToAmount(priceMinor) };
  const changes = { priceMinor, ...ranks };
  const who = { actorKind: 'seller', actorId: actor.id } as const;
  return recordLotEvent(lot, { act: 'price-changed', ...who, detail, changes }, unit);
}
