import { UniqueConstraintError } from 'sequelize';
import { MeasureError } from '#shared/domain-error.ts';
import { fromAmount } from '#shared/money.ts';
import { RULES_VERSION } from '#shared/rules.ts';
import type { PurchaseRequest } from '#shared/schemas/deals.ts';
import { commissionFor } from '#shared/settlement/commission.ts';
import type { QuoteRef } from '#shared/settlement/sheet-types.ts';
import {
  AppError,
  ConflictError,
  ForbiddenError,
  InvalidError,
  NotFoundError,
  invariant,
} from '#server/app-error.ts';
import { newCode, newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { openDealAccounts } from '#server/features/ledger/open-accounts.ts';
import { currentFees } from '#server/features/fees/fee-queries.ts';
import { moveLot, recordLotEvent } from '#server/features/lots/move-lot.ts';
import { useFix } from '#server/features/price-fixes/end-price-fix.ts';
import { openFixOf } from '#server/features/price-fixes/price-fix-queries.ts';
import { quoteRefs, type QuoteBoard } from '#server/features/quotes/quote-queries.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import type { PriceFix } from '#server/models/price-fix.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { fundByFrom } from './deadlines.ts';
import { sheetInputFor, storeDealSheets } from './deal-sheets.ts';
import { recordAgreement } from './move-deal.ts';

export type PurchaseInput = Pick<PurchaseRequest, 'total' | 'delivery'> & { lotId: string };

/** A lot that has not been in the market; of one that was, a buyer is told that it no longer is. */
const NEVER_SHOWN: readonly Lot['state'][] = ['draft', 'submitted', 'returned'];

/** What is agreed: the lot, its sum, the quotes that the sheets rest on, and the price fix that this uses up. */
type Offer = {
  lot: Lot;
  priceMinor: bigint;
  quotes: QuoteRef[];
  board: QuoteBoard | null;
  fix: PriceFix | null;
};

/** An outright price stands by itself; the quotes only say what the metal is worth. */
function outrightOffer(lot: Lot, board: QuoteBoard): Offer {
  if (lot.state === 'reserved') throw new ConflictError('lot-taken');
  if (lot.state !== 'open' || lot.pricingBasis !== 'outright' || lot.priceMinor === null)
    throw new ConflictError('lot-not-open');
  return { lot, priceMinor: lot.priceMinor, quotes: quoteRefs(board), board, fix: null };
}

/** A linked price is bought inside the buyer's own fix alone, at exactly its sum and quotes, and before it ends. */
async function fixedOffer(lot: Lot, unit: Unit, actor: Actor): Promise<Offer> {
  if (lot.state === 'open') throw new ConflictError('price-fix-required');
  const fix = await openFixOf(lot.id, unit.tx);
  if (lot.state !== 'reserved') throw new ConflictError('lot-not-open');
  if (fix === null || fix.memberId !== actor.id) throw new ConflictError('lot-taken');
  if (unit.now >= fix.fixedUntil) throw new ConflictError('price-fix-ended');
  return { lot, priceMinor: fix.priceMinor, quotes: fix.quotes as QuoteRef[], board: null, fix };
}

async function readOffer(lotId: string, unit: Unit & { quotes: QuoteBoard }, actor: Actor): Promise<Offer> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || (lot.sellerId !== actor.id && NEVER_SHOWN.includes(lot.state)))
    throw new NotFoundError();
  if (lot.sellerId === actor.id) throw new ConflictError('own-lot');
  if (lot.state === 'sold') throw new ConflictError('lot-taken');
  const offer =
    lot.pricingBasis === 'linked' ? await fixedOffer(lot, unit, actor) : outrightOffer(lot, unit.quotes);
  const isPastClosing = lot.closesAt !== null && lot.closesAt.getTime() <= unit.now.getTime();
  if (lot.settlesOn !== 'stated' || (isPastClosing && offer.fix === null))
    throw new ConflictError('lot-not-open');
  const seller = await Member.findByPk(lot.sellerId, { transaction: unit.tx });
  if (seller === null || seller.suspendedAt !== null) throw new ConflictError('lot-not-open');
  return offer;
}

async function assertMayBuy(unit: Unit, actor: Actor): Promise<void> {
  const buyer = await Member.findByPk(actor.id, { transaction: unit.tx });
  if (buyer === null || buyer.suspendedAt !== null) throw new ForbiddenError('member-suspended');
}

function assertServed(lot: Lot, country: string): void {
  const served = lot.destinations as unknown;
  if (Array.isArray(served) && served.includes(country)) return;
  throw new AppError('destination-not-served', 'The seller does not ship to this country.', [
    {
      pointer: '/delivery/country',
      code: 'destination-not-served',
      message: 'The seller does not ship there',
    },
  ]);
}

function assertTotal(given: string, totalMinor: bigint): void {
  try {
    if (fromAmount(given, '/total').minor === totalMinor) return;
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    throw new InvalidError([{ pointer: '/total', code: error.code, message: error.message }]);
  }
  throw new ConflictError(
    'price-changed',
    'Price or parcel charge have changed; look at the new total first.',
  );
}

async function insertDeal(
  { lot, priceMinor }: Offer,
  input: PurchaseInput,
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const fee = (await currentFees(unit.now, unit.tx)).find(({ method }) => method === 'card');
  invariant(fee !== undefined, 'every payment method has a rate');
  const shippingMinor = lot.shippingMinor ?? 0n;
  const { delivery } = input;
  try {
    return await Deal.create(
      {
        id: newId(),
        code: newCode('D'),
        lotId: lot.id,
        sellerId: lot.sellerId,
        buyerId: actor.id,
        state: 'agreed',
        liveLotId: lot.id,
        priceMinor,
        shippingMinor,
        totalMinor: priceMinor + shippingMinor,
        commissionPercent: fee.percent,
        commissionMinimumMinor: fee.minimumMinor,
        commissionMinor: commissionFor(priceMinor, fee),
        paymentMethod: 'card',
        deliveryName: delivery.name,
        deliveryLine1: delivery.line1,
        deliveryLine2: delivery.line2,
        deliveryCity: delivery.city,
        deliveryPostcode: delivery.postcode,
        deliveryRegion: delivery.region,
        deliveryCountry: delivery.country,
        deliveryPhone: delivery.phone,
        rulesVersion: RULES_VERSION,
        agreedAt: unit.now,
        fundBy: fundByFrom(unit.now),
      },
      { transaction: unit.tx },
    );
  } catch (error) {
    if (error instanceof UniqueConstraintError && 'deals_live_lot' in error.fields) {
      throw new ConflictError('lot-taken');
    }
    throw error;
  }
}

/** Within a fix the lot is reserved already; that it is now for a deal stands in its history all the same. */
async function reserveLot({ lot, fix }: Offer, deal: Deal, unit: Unit, actor: Actor): Promise<void> {
  const detail = { dealCode: deal.code };
  const act = { act: 'reserved', actorKind: 'buyer', actorId: actor.id, detail } as const;
  if (fix === null) {
    await moveLot(lot, 'reserved', act, unit);
    return;
  }
  await useFix(fix, deal.id, unit);
  await recordLotEvent(lot, act, unit);
}

/**
 * Makes the one deal over a lot at its outright price, or inside the buyer's own price fix at exactly its sum and quotes.
 * Everything is computed here: price, parcel, total, commission at the rate valid now, and both provisional sheets at the
 * newest accepted quotes or the fix's; the buyer's total is only compared. The address is frozen into the deal. The lot is
 * reserved until the deal is funded or lapses.
 *
 * Expects the lot's guard row to be locked; a UNIQUE key on the live deal of a lot stands behind it.
 * Throws `not-found`, `own-lot`, `lot-taken`, `lot-not-open`, `price-fix-required`, `price-fix-ended`, `member-suspended`,
 * `destination-not-served`, `price-changed`, `no-fresh-quote`, `invalid-input`.
 */
export async function purchaseLot(
  input: PurchaseInput,
  unit: Unit & { quotes: QuoteBoard },
  actor: Actor,
): Promise<Deal> {
  await assertMayBuy(unit, actor);
  const offer = await readOffer(input.lotId, unit, actor);
  const { lot, priceMinor } = offer;
  assertServed(lot, input.delivery.country);
  assertTotal(input.total, priceMinor + (lot.shippingMinor ?? 0n));
  const deal = await insertDeal(offer, input, unit, actor);
  await openDealAccounts(deal.id, unit);
  const sheetInput = await sheetInputFor(lot, deal, offer, unit);
  await storeDealSheets(deal.id, 'provisional', sheetInput, unit);
  await reserveLot(offer, deal, unit, actor);
  await recordAgreement(deal, { act: 'agreed', actorKind: 'buyer', actorId: actor.id }, unit);
  return deal;
}
