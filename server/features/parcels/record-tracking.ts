import type { Unit } from '#server/database/transaction.ts';
import { deliverDeal } from '#server/features/deals/deliver-deal.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { loadDeal } from '#server/features/deals/deal-queries.ts';
import type { ParcelTracker } from '#server/integrations/carrier.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Parcel } from '#server/models/parcel.ts';

export type TrackingOutcome = 'unchanged' | 'moved' | 'delivered' | 'delivered-unsigned' | 'lost';

const EVENT_OF_STATUS: Partial<Record<ParcelTracker['status'], string>> = {
  lost: 'parcel-lost',
  returned: 'parcel-returned',
};

async function recordMove(deal: Deal, status: ParcelTracker['status'], unit: Unit): Promise<TrackingOutcome> {
  const act = EVENT_OF_STATUS[status] ?? 'parcel-moved';
  await recordDealEvent(deal, { act, actorKind: 'carrier', detail: { status } }, unit);
  return EVENT_OF_STATUS[status] === undefined ? 'moved' : 'lost';
}

async function recordDelivery(
  deal: Deal,
  delivery: NonNullable<ParcelTracker['delivery']>,
  unit: Unit,
): Promise<TrackingOutcome> {
  if (deal.state !== 'shipped' || !delivery.signed) {
    const act = delivery.signed ? 'parcel-moved' : 'delivered-unsigned';
    await recordDealEvent(deal, { act, actorKind: 'carrier', detail: { status: 'delivered' } }, unit);
    return delivery.signed ? 'moved' : 'delivered-unsigned';
  }
  await deliverDeal(
    deal,
    { act: 'delivered', actorKind: 'carrier', deliveredAt: delivery.at, signedBy: delivery.signedBy },
    unit,
  );
  return 'delivered';
}

/**
 * Takes over what the carrier says of a deal's parcel: each change once. Delivered against signature makes the deal
 * delivered; without one it waits for the buyer's word; lost or brought back makes it contestable.
 *
 * The caller holds the deal's lock. Throws nothing that a carrier's answer could cause.
 */
export async function recordTracking(
  dealId: string,
  tracker: Pick<ParcelTracker, 'status' | 'delivery'>,
  unit: Unit,
): Promise<TrackingOutcome> {
  const deal = await loadDeal(dealId, unit.tx);
  const parcel: Parcel | null = deal.parcel ?? null;
  if (parcel === null) return 'unchanged';
  const { status, delivery } = tracker;
  const isNews = parcel.trackerStatus !== status;
  await parcel.update(
    {
      checkedAt: unit.now,
      trackerStatus: status,
      ...(delivery === null
        ? {}
        : { deliveredAt: delivery.at, isSigned: delivery.signed, signedBy: delivery.signedBy }),
    },
    { transaction: unit.tx },
  );
  if (!isNews) return 'unchanged';
  return delivery === null ? recordMove(deal, status, unit) : recordDelivery(deal, delivery, unit);
}
