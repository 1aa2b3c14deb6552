import type { Unit } from '#server/database/transaction.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';
import { Refund } from '#server/models/refund.ts';
import { applyCheckout } from './apply-checkout.ts';
import { applyRefund } from './apply-refund.ts';
import { findDealLocks } from './deal-locks.ts';
import type { ProviderEventReader } from '#server/features/provider-events/provider-event-reader.ts';

const CHANGED = new Set(['funded', 'late', 'second', 'closed']);

/** A session was paid or has expired: the session is read again and its present state applied. */
export const readCheckoutEvent: ProviderEventReader = async (event) => {
  const reading = await paymentClient().readCheckout(event.objectId);
  const { dealId } = reading;
  const locks = dealId === null ? null : await findDealLocks(dealId);
  if (dealId === null || locks === null) return null;
  return {
    locks,
    apply: async (unit) => CHANGED.has(await applyCheckout({ dealId, reading }, unit)),
  };
};

function text(value: unknown): string | null {
  return typeof value === 'string' && value !== '' ? value : null;
}

function inner(value: unknown): Record<string, unknown> {
  return typeof value === 'object' && value !== null ? (value as Record<string, unknown>) : {};
}

async function isDeclineKnown(dealId: string, chargeId: string, unit: Unit): Promise<boolean> {
  const events = await DealEvent.findAll({
    where: { dealId, act: 'payment-failed' },
    transaction: unit.tx,
  });
  return events.some(({ detail }) => inner(detail)['chargeId'] === chargeId);
}

/** A declined card is part of the deal's story and changes nothing: the buyer tries another on the same page. */
export const readDeclineEvent: ProviderEventReader = async (event) => {
  const dealId = text(inner(event.object['metadata'])['deal_id']);
  const locks = dealId === null ? null : await findDealLocks(dealId);
  if (dealId === null || locks === null) return null;
  const failure = inner(event.object['last_payment_error']);
  const chargeId = text(failure['charge']) ?? event.objectId;
  const reason = text(failure['decline_code']) ?? text(failure['code']);
  return {
    locks,
    apply: async (unit) => {
      const deal = await Deal.findByPk(dealId, { transaction: unit.tx });
      if (deal?.state !== 'agreed' || (await isDeclineKnown(dealId, chargeId, unit))) return false;
      const detail = { chargeId, reason };
      await recordDealEvent(deal, { act: 'payment-failed', actorKind: 'provider', detail }, unit);
      return true;
    },
  };
};

/** A refund changed. One whose order is still being booked is left: the order itself notes how it stands. */
export const readRefundEvent: ProviderEventReader = async (event) => {
  const refund = await Refund.findOne({ where: { providerRefundId: event.objectId } });
  const locks = refund === null ? null : await findDealLocks(refund.dealId);
  if (locks === null) return null;
  const reading = await paymentClient().readRefund(event.objectId);
  return { locks, apply: (unit) => applyRefund({ reading }, unit) };
};
