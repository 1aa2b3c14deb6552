import { randomBytes } from 'node:crypto';
import { minorToAmount } from '#shared/money.ts';
import type { DeliveryAddress } from '#shared/schemas/deals.ts';
import { databaseNow, withTransaction, type Unit } from '#server/database/transaction.ts';
import { acceptDeal } from '#server/features/deals/accept-deal.ts';
import { contestDeal } from '#server/features/deals/contest-deal.ts';
import { purchaseLot } from '#server/features/deals/purchase-lot.ts';
import { recordReceipt } from '#server/features/receipts/record-receipt.ts';
import { shipDeal } from '#server/features/deals/ship-deal.ts';
import { recordTracking } from '#server/features/parcels/record-tracking.ts';
import { fundDeal } from '#server/features/payments/fund-deal.ts';
import { openCheckout, prepareCheckout } from '#server/features/payments/prepare-checkout.ts';
import { newestQuotes } from '#server/features/quotes/quote-queries.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { buildLot } from './build-lot.ts';
import { buildMember, type BuiltMember } from './build-member.ts';

export const DELIVERY: DeliveryAddress = {
  name: 'Ada Quill',
  line1: '4 Cooper Row',
  line2: '',
  city: 'Low Tannery',
  postcode: '40718',
  region: 'Harrow Vale',
  country: 'US',
  phone: '+1 555 0142',
};

/** Steps of the usual way, and the two ends that a buyer can bring about. */
export type BuiltState = 'agreed' | 'funded' | 'shipped' | 'delivered' | 'settled' | 'contested';
export type BuiltDeal = { id: string; code: string; lot: Lot; seller: BuiltMember; buyer: BuiltMember };
type Wishes = { state?: BuiltState; seller?: BuiltMember; buyer?: BuiltMember; hasReceipt?: boolean };

const STEPS: readonly BuiltState[] = ['agreed', 'funded', 'shipped', 'delivered', 'settled'];

/** The next step in a transaction with the guard rows of lot and deal. */
export async function inDeal<T>(deal: BuiltDeal, work: (unit: Unit) => Promise<T>): Promise<T> {
  return withTransaction({ lots: [deal.lot.id], deals: [deal.id] }, work);
}

export async function purchase(lot: Lot, buyer: BuiltMember): Promise<Deal> {
  const quotes = await newestQuotes(await databaseNow());
  const total = minorToAmount((lot.priceMinor ?? 0n) + (lot.shippingMinor ?? 0n));
  return withTransaction({ lots: [lot.id] }, (unit) =>
    purchaseLot({ lotId: lot.id, total, delivery: DELIVERY }, { ...unit, quotes }, buyer.actor),
  );
}

/** What the provider would say of a paid session, with its fee of 2.9 % and 30 cents cut to the cent. */
function paidCheckout(amountMinor: bigint) {
  const mark = randomBytes(6).toString('hex');
  return {
    sessionId: `cs_test_${mark}`,
    amountMinor,
    currency: 'USD',
    paymentIntentId: `pi_${mark}`,
    chargeId: `ch_${mark}`,
    balanceTransactionId: `txn_${mark}`,
    feeMinor: (amountMinor * 29n) / 1000n + 30n,
  };
}

async function fund(built: BuiltDeal): Promise<void> {
  const { totalMinor } = await Deal.findByPk(built.id, { rejectOnEmpty: true });
  const checkout = paidCheckout(totalMinor);
  await inDeal(built, async (unit) => {
    const { attempt } = await prepareCheckout({ dealId: built.id }, unit);
    const { sessionId } = checkout;
    await openCheckout({ dealId: built.id, attempt, sessionId, url: 'http://pay.example' }, unit);
    await fundDeal({ dealId: built.id, checkout }, unit);
  });
}

export async function ship(built: BuiltDeal): Promise<void> {
  const { priceMinor } = await Deal.findByPk(built.id, { rejectOnEmpty: true });
  const parcel = {
    carrier: 'Vale Post',
    trackingNumber: `VP${randomBytes(5).toString('hex').toUpperCase()}`,
    insuredValue: minorToAmount(priceMinor),
  };
  await inDeal(built, (unit) => shipDeal({ dealId: built.id, ...parcel }, unit, built.seller.actor));
}

/** The carrier's word; against signature unless said otherwise. */
export async function deliver(built: BuiltDeal, signed = true): Promise<void> {
  await inDeal(built, (unit) => {
    const delivery = { at: unit.now, signed, signedBy: signed ? 'A. Quill' : null };
    return recordTracking(built.id, { status: 'delivered', delivery }, unit);
  });
}

async function receive(built: BuiltDeal): Promise<void> {
  const { grossValue, grossUnit } = built.lot;
  const mass = { value: grossValue ?? '', unit: grossUnit ?? '' };
  await inDeal(built, (unit) =>
    recordReceipt({ dealId: built.id, mass, photoFileId: null }, unit, built.buyer.actor),
  );
}

async function contest(built: BuiltDeal): Promise<void> {
  const objection = { reason: 'wrong_mass', note: 'It weighs two grams less than stated.' } as const;
  await inDeal(built, (unit) => contestDeal({ dealId: built.id, ...objection }, unit, built.buyer.actor));
}

async function advance(built: BuiltDeal, step: BuiltState, hasReceipt: boolean): Promise<void> {
  if (step === 'funded') await fund(built);
  if (step === 'shipped') await ship(built);
  if (step === 'delivered') {
    await deliver(built);
    if (hasReceipt) await receive(built);
  }
  if (step === 'settled') {
    await inDeal(built, (unit) => acceptDeal(built.id, unit, built.buyer.actor));
  }
}

/** A deal with its own seller, lot and buyer, brought to the state by the product's own commands. */
export async function buildDeal(wishes: Wishes = {}): Promise<BuiltDeal> {
  const { state = 'agreed' } = wishes;
  const seller = wishes.seller ?? (await buildMember({ canSell: true }));
  const buyer = wishes.buyer ?? (await buildMember());
  const made = await buildLot({ state: 'open', sellerId: seller.id });
  const lot = await Lot.findByPk(made.id, { rejectOnEmpty: true });
  const { id, code } = await purchase(lot, buyer);
  const built: BuiltDeal = { id, code, lot, seller, buyer };
  const goal = state === 'contested' ? 'delivered' : state;
  const hasReceipt = wishes.hasReceipt ?? state === 'settled';
  for (const step of STEPS.slice(1, STEPS.indexOf(goal) + 1)) await advance(built, step, hasReceipt);
  if (state === 'contested') await contest(built);
  return built;
}
