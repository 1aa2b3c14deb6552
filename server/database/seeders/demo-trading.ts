import { dec } from '#shared/decimal.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { applyPayout } from '#server/features/payouts/apply-payout.ts';
import { findDealLocks } from '#server/features/payments/deal-locks.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { Payment } from '#server/models/payment.ts';
import { Payout } from '#server/models/payout.ts';
import { DEMO_ADDRESSES, type BuyerKey } from './demo-people.ts';
import { press } from './demo-services.ts';
import type { DemoPerson } from './demo-stage.ts';

/** Buys the lot and answers the deal's code. */
export async function buy(lotCode: string, buyer: DemoPerson): Promise<string> {
  const lot = await Lot.findOne({ where: { code: lotCode }, rejectOnEmpty: true });
  const totalMinor = lot.priceMinor! + (lot.shippingMinor ?? 0n);
  const deal = await buyer.visitor.post(`/api/v1/lots/${lotCode}/purchase`, {
    total: dec(totalMinor).div(100).toString(),
    delivery: DEMO_ADDRESSES[buyer.key as BuyerKey],
    confirmsAge: true,
    confirmsRules: true,
  });
  return String(deal.code);
}

/** Pays on the provider's page, by its button, and comes back. */
export async function pay(dealCode: string, buyer: DemoPerson): Promise<void> {
  await buyer.visitor.post(`/api/v1/deals/${dealCode}/payment`);
  const deal = await Deal.findOne({ where: { code: dealCode }, rejectOnEmpty: true });
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  await press('payments', '/control/pay', { sessionId: payment.providerSessionId });
  await buyer.visitor.post(`/api/v1/deals/${dealCode}/payment/refresh`);
}

export async function ship(dealCode: string, seller: DemoPerson, trackingNumber: string): Promise<void> {
  const deal = await Deal.findOne({ where: { code: dealCode }, rejectOnEmpty: true });
  await seller.visitor.post(`/api/v1/deals/${dealCode}/ship`, {
    carrier: 'Vale Parcels',
    trackingNumber,
    insuredValue: dec(deal.priceMinor).div(100).toString(),
  });
}

export async function weigh(
  dealCode: string,
  buyer: DemoPerson,
  mass: { value: string; unit: string },
): Promise<void> {
  await buyer.visitor.post(`/api/v1/deals/${dealCode}/receipt`, { mass });
}

/** Asks the provider how the payout stands and applies it, as its message would. */
export async function settlePayout(dealCode: string): Promise<void> {
  const deal = await Deal.findOne({ where: { code: dealCode }, rejectOnEmpty: true });
  const payout = await Payout.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  const reading = await paymentClient().readPayout(payout.providerPayoutId!, payout.providerAccountId);
  const locks = await findDealLocks(deal.id);
  await withTransaction(locks ?? {}, (unit) => applyPayout({ dealId: deal.id, reading }, unit));
}
