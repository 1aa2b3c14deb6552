import { dec, plain } from '#shared/decimal.ts';
import { checkPrice, percentText, readLinkedPercent } from '#shared/lot-pricing.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import type { PriceRequest } from '#shared/schemas/lots.ts';
import { ConflictError, InvalidError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { rankColumnsOf } from '#server/features/register/rank-lot.ts';
import type { Lot } from '#server/models/lot.ts';
import { orRefuse } from '#server/refused.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { recordLotEvent } from './move-lot.ts';
import { readOwnLot } from './own-lot.ts';

export type ChangePriceInput = PriceRequest & { lotId: string };

/** A lot that its floor has paused may be priced anew before it is offered again; any other only while it is open. */
function assertPriceMayChange(lot: Lot): void {
  if (lot.state === 'open' || (lot.state === 'paused' && lot.floorPercent !== null)) return;
  throw new ConflictError('illegal-transition', 'The price can change only while the lot is open.');
}

function refuseBasis(pointer: '/price' | '/linkedPercent', message: string): never {
  throw new InvalidError([{ pointer, code: 'pricing-differs', message }]);
}

async function changeSum(lot: Lot, price: string, unit: Unit, actor: Actor): Promise<Lot> {
  const priceMinor = orRefuse(() => {
    const { minor } = fromAmount(price, '/price');
    checkPrice(minor);
    return minor;
  });
  if (lot.pricingBasis !== 'outright') refuseBasis('/price', 'This lot is priced by its share of melt.');
  assertPriceMayChange(lot);
  const { priceMinor: before } = lot;
  invariant(before !== null, 'an open lot that is not linked has a price');
  if (before === priceMinor) return lot;
  const ranks = await rankColumnsOf(lot, { grade: lot.evidenceGrade, priceMinor }, unit);
  const detail = { from: minorToAmount(before), to: minorToAmount(priceMinor) };
  const changes = { priceMinor, ...ranks };
  const who = { actorKind: 'seller', actorId: actor.id } as const;
  return recordLotEvent(lot, { act: 'price-changed', ...who, detail, changes }, unit);
}

async function changePercent(lot: Lot, percent: string, unit: Unit, actor: Actor): Promise<Lot> {
  const linkedPercent = orRefuse(() => readLinkedPercent(percent));
  if (lot.pricingBasis !== 'linked') refuseBasis('/linkedPercent', 'This lot is priced by a sum.');
  assertPriceMayChange(lot);
  const { linkedPercent: before } = lot;
  invariant(before !== null, 'a linked lot has its share of melt');
  if (dec(before).eq(linkedPercent)) return lot;
  const detail = { fromPercent: percentText(before), toPercent: percentText(linkedPercent) };
  const who = { actorKind: 'seller', actorId: actor.id } as const;
  const changes = { linkedPercent: plain(dec(linkedPercent)) };
  return recordLotEvent(lot, { act: 'price-changed', ...who, detail, changes }, unit);
}

/**
 * Changes the price of an open lot, a sum and its ranking key or a share of melt, which ranks by itself; never of a reserved
 * one, whose buyer has agreed or holds a price fix. The same price again changes nothing. Expects the lot's lock, which a
 * purchase and a price fix take too.
 * Throws `not-found`, `forbidden`, `member-suspended`, `invalid-input` at `/price` or `/linkedPercent`, `illegal-transition`.
 */
export async function changePrice(input: ChangePriceInput, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await readOwnLot(input.lotId, unit, actor);
  if (input.price !== undefined) return changeSum(lot, input.price, unit, actor);
  invariant(input.linkedPercent !== undefined, 'a request gives a sum or a share of melt');
  return changePercent(lot, input.linkedPercent, unit, actor);
}
