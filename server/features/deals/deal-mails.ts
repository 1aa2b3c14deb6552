import { minorToAmount } from '#shared/money.ts';
import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import type { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import type { Parcel } from '#server/models/parcel.ts';
import { CONTEST_REASON_LABELS } from './contest-reasons.ts';
import { ruleByFrom } from './deadlines.ts';

type Subject = { dealCode: string; lotTitle: string };
type Side = 'buyer' | 'seller';

async function subjectOf(deal: Deal, unit: Unit): Promise<Subject> {
  const lot = deal.lot ?? (await Lot.findByPk(deal.lotId, { transaction: unit.tx }));
  return { dealCode: deal.code, lotTitle: lot?.title ?? deal.code };
}

function memberOf(deal: Deal, side: Side): string {
  return side === 'buyer' ? deal.buyerId : deal.sellerId;
}

/** What goes to the seller when the deal settles: price without commission, and the parcel's charge in full. */
export function netMinorOf(deal: Deal): bigint {
  return deal.totalMinor - deal.commissionMinor;
}

const SIDES: readonly Side[] = ['buyer', 'seller'];

/** Ship-by to the seller, receipt to the buyer. To be called after the deal has been moved to funded. */
export async function mailDealFunded(deal: Deal, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  invariant(deal.shipBy !== null, 'a funded deal has its shipping deadline');
  const shipBy = deal.shipBy.toISOString();
  const total = minorToAmount(deal.totalMinor);
  await enqueueMail(
    {
      mail: 'deal-funded-seller',
      memberId: deal.sellerId,
      dealId: deal.id,
      uniqueKey: `deal-funded:${deal.id}:seller`,
      input: {
        ...subject,
        total,
        shipBy,
        deliveryName: deal.deliveryName,
        deliveryPlace: `${deal.deliveryCity}, ${deal.deliveryCountry}`,
      },
    },
    unit,
  );
  const price = minorToAmount(deal.priceMinor);
  const shipping = minorToAmount(deal.shippingMinor);
  await enqueueMail(
    {
      mail: 'deal-funded-buyer',
      memberId: deal.buyerId,
      dealId: deal.id,
      uniqueKey: `deal-funded:${deal.id}:buyer`,
      input: { ...subject, price, shipping, total, shipBy },
    },
    unit,
  );
}

export async function mailParcelShipped(deal: Deal, parcel: Parcel, unit: Unit): Promise<void> {
  invariant(deal.arriveBy !== null, 'a shipped deal knows when its parcel is late');
  await enqueueMail(
    {
      mail: 'parcel-shipped',
      memberId: deal.buyerId,
      dealId: deal.id,
      uniqueKey: `parcel-shipped:${deal.id}:buyer`,
      input: {
        ...(await subjectOf(deal, unit)),
        carrier: parcel.carrier,
        trackingNumber: parcel.trackingNumber,
        insured: minorToAmount(parcel.insuredMinor),
        arriveBy: deal.arriveBy.toISOString(),
      },
    },
    unit,
  );
}

export async function mailParcelDelivered(deal: Deal, signedBy: string | null, unit: Unit): Promise<void> {
  invariant(deal.deliveredAt !== null && deal.inspectBy !== null, 'a delivered deal has its dates');
  const input = {
    ...(await subjectOf(deal, unit)),
    deliveredAt: deal.deliveredAt.toISOString(),
    inspectBy: deal.inspectBy.toISOString(),
  };
  const key = `parcel-delivered:${deal.id}`;
  await enqueueMail(
    {
      mail: 'parcel-delivered-buyer',
      memberId: deal.buyerId,
      dealId: deal.id,
      uniqueKey: `${key}:buyer`,
      input: { ...input, signedBy },
    },
    unit,
  );
  await enqueueMail(
    {
      mail: 'parcel-delivered-seller',
      memberId: deal.sellerId,
      dealId: deal.id,
      uniqueKey: `${key}:seller`,
      input,
    },
    unit,
  );
}

export async function mailDealAccepted(deal: Deal, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  await enqueueMail(
    {
      mail: 'deal-accepted-seller',
      memberId: deal.sellerId,
      dealId: deal.id,
      uniqueKey: `deal-accepted:${deal.id}:seller`,
      input: {
        ...subject,
        price: minorToAmount(deal.priceMinor),
        commission: minorToAmount(deal.commissionMinor),
        shipping: minorToAmount(deal.shippingMinor),
        net: minorToAmount(netMinorOf(deal)),
      },
    },
    unit,
  );
  await enqueueMail(
    {
      mail: 'deal-accepted-buyer',
      memberId: deal.buyerId,
      dealId: deal.id,
      uniqueKey: `deal-accepted:${deal.id}:buyer`,
      input: { ...subject, total: minorToAmount(deal.totalMinor) },
    },
    unit,
  );
}

/** To both, with the final sheet attached. A payout that failed and was paid later is told once. */
export async function mailPayoutSent(deal: Deal, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  const paidAt = (deal.paidOutAt ?? unit.now).toISOString();
  await enqueueMail(
    {
      mail: 'payout-sent-seller',
      memberId: deal.sellerId,
      dealId: deal.id,
      uniqueKey: `payout-sent:${deal.id}:seller`,
      input: { ...subject, net: minorToAmount(netMinorOf(deal)), paidAt },
    },
    unit,
  );
  await enqueueMail(
    {
      mail: 'payout-sent-buyer',
      memberId: deal.buyerId,
      dealId: deal.id,
      uniqueKey: `payout-sent:${deal.id}:buyer`,
      input: { ...subject, total: minorToAmount(deal.totalMinor), paidAt },
    },
    unit,
  );
}

/** `occasion` tells one failure from the next: the provider's payout id. */
export async function mailPayoutFailed(
  deal: Deal,
  { failureCode, occasion }: { failureCode: string; occasion: string },
  unit: Unit,
): Promise<void> {
  const input = { ...(await subjectOf(deal, unit)), net: minorToAmount(netMinorOf(deal)), failureCode };
  const uniqueKey = `payout-failed:${deal.id}:${occasion}`;
  await enqueueMail(
    { mail: 'payout-failed', memberId: deal.sellerId, dealId: deal.id, uniqueKey, input },
    unit,
  );
}

export async function mailDealCancelled(deal: Deal, reason: string, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  const total = minorToAmount(deal.totalMinor);
  for (const side of SIDES) {
    await enqueueMail(
      {
        mail: 'deal-cancelled',
        memberId: memberOf(deal, side),
        dealId: deal.id,
        uniqueKey: `deal-cancelled:${deal.id}:${side}`,
        input: { ...subject, side, total, reason },
      },
      unit,
    );
  }
}

/** To be called when the provider has taken the refund. */
export async function mailDealRefunded(deal: Deal, unit: Unit): Promise<void> {
  const input = { ...(await subjectOf(deal, unit)), total: minorToAmount(deal.totalMinor) };
  const uniqueKey = `deal-refunded:${deal.id}:buyer`;
  await enqueueMail(
    { mail: 'deal-refunded', memberId: deal.buyerId, dealId: deal.id, uniqueKey, input },
    unit,
  );
}

export async function mailDealLapsed(deal: Deal, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  for (const side of SIDES) {
    const uniqueKey = `deal-lapsed:${deal.id}:${side}`;
    await enqueueMail(
      {
        mail: 'deal-lapsed',
        memberId: memberOf(deal, side),
        dealId: deal.id,
        uniqueKey,
        input: { ...subject, side },
      },
      unit,
    );
  }
}

/** A payment that succeeded after the lapse and is sent back. */
export async function mailLatePayment(deal: Deal, unit: Unit): Promise<void> {
  const input = { ...(await subjectOf(deal, unit)), total: minorToAmount(deal.totalMinor) };
  const uniqueKey = `late-payment:${deal.id}:buyer`;
  await enqueueMail(
    { mail: 'late-payment-refunded', memberId: deal.buyerId, dealId: deal.id, uniqueKey, input },
    unit,
  );
}

/** A second payment of a deal that was paid before; sent back while the deal goes on. */
export async function mailSecondPayment(
  deal: Deal,
  { chargeId, amountMinor }: { chargeId: string; amountMinor: bigint },
  unit: Unit,
): Promise<void> {
  const input = { ...(await subjectOf(deal, unit)), total: minorToAmount(amountMinor) };
  const uniqueKey = `second-payment:${chargeId}`;
  await enqueueMail(
    { mail: 'second-payment-refunded', memberId: deal.buyerId, dealId: deal.id, uniqueKey, input },
    unit,
  );
}

export async function mailDealContested(
  deal: Deal,
  { reason, note }: { reason: keyof typeof CONTEST_REASON_LABELS; note: string },
  unit: Unit,
): Promise<void> {
  const subject = await subjectOf(deal, unit);
  const decideBy = ruleByFrom(deal.contestedAt ?? unit.now).toISOString();
  for (const side of SIDES) {
    await enqueueMail(
      {
        mail: 'deal-contested',
        memberId: memberOf(deal, side),
        dealId: deal.id,
        uniqueKey: `deal-contested:${deal.id}:${side}`,
        input: { ...subject, side, reason: CONTEST_REASON_LABELS[reason], note, decideBy },
      },
      unit,
    );
  }
}

/** To be called after the deal has been moved to contested. */
export async function mailDealTakenUp(deal: Deal, reason: string, unit: Unit): Promise<void> {
  const subject = await subjectOf(deal, unit);
  const decideBy = ruleByFrom(deal.contestedAt ?? unit.now).toISOString();
  for (const side of SIDES) {
    await enqueueMail(
      {
        mail: 'deal-taken-up',
        memberId: memberOf(deal, side),
        dealId: deal.id,
        uniqueKey: `deal-taken-up:${deal.id}:${side}`,
        input: { ...subject, side, reason, decideBy },
      },
      unit,
    );
  }
}

export async function mailDealRuled(
  deal: Deal,
  { ruling, reason }: { ruling: 'refund' | 'release'; reason: string },
  unit: Unit,
): Promise<void> {
  const subject = await subjectOf(deal, unit);
  for (const side of SIDES) {
    await enqueueMail(
      {
        mail: 'deal-ruled',
        memberId: memberOf(deal, side),
        dealId: deal.id,
        uniqueKey: `deal-ruled:${deal.id}:${side}`,
        input: { ...subject, ruling, reason },
      },
      unit,
    );
  }
}
