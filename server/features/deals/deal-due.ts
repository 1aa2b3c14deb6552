import type { DealAnswer } from '#shared/schemas/deals.ts';
import type { Deal } from '#server/models/deal.ts';
import { ruleByFrom } from './deadlines.ts';
import { isInspectionOver, isOverdueOrLost, isUnsignedDelivery } from './deal-policy.ts';

export type Due = NonNullable<DealAnswer['due']>;

function dueWhenShipped(deal: Deal, now: Date): Omit<Due, 'at'> & { at: Date | null } {
  if (isUnsignedDelivery(deal)) {
    return {
      who: 'buyer',
      act: 'Confirm the delivery',
      at: deal.arriveBy,
      silence:
        'It was delivered without a signature. It does not count as delivered until the buyer confirms it; from this day on it can be contested.',
    };
  }
  if (isOverdueOrLost(deal, now)) {
    return {
      who: 'buyer',
      act: 'Contest, if it has not come',
      at: null,
      silence:
        'The parcel is late or lost. The money stays held until it is delivered or the desk has ruled.',
    };
  }
  return {
    who: 'carrier',
    act: 'Deliver against signature',
    at: deal.arriveBy,
    silence: 'If it has not come by then, the buyer can contest, and the desk rules.',
  };
}

function dueOfState(deal: Deal, now: Date): (Omit<Due, 'at'> & { at: Date | null }) | null {
  switch (deal.state) {
    case 'agreed':
      return {
        who: 'buyer',
        act: 'Pay into escrow',
        at: deal.fundBy,
        silence: 'If the payment is not started by then, the purchase lapses and the lot is open again.',
      };
    case 'funded':
      return {
        who: 'seller',
        act: 'Ship, insured and against signature',
        at: deal.shipBy,
        silence: 'If it is not shipped by then, the deal is cancelled and the buyer gets everything back.',
      };
    case 'shipped':
      return dueWhenShipped(deal, now);
    case 'delivered':
      return {
        who: 'buyer',
        act: (deal.receipt ?? null) === null ? 'Weigh it and record the mass' : 'Accept or contest',
        at: deal.inspectBy,
        silence: isInspectionOver(deal, now)
          ? 'The time to inspect is over. The money stays held until the buyer accepts or contests, or the desk takes up the deal and rules.'
          : 'Nothing is accepted by silence: the money stays held, and from then on the desk can take up the deal and rule.',
      };
    case 'contested':
      return {
        who: 'desk',
        act: 'Rule on the deal',
        at: ruleByFrom(deal.contestedAt ?? now),
        silence: 'Until the desk has ruled, the money stays held.',
      };
    case 'settled':
      return {
        who: 'provider',
        act: 'Pay out to the seller',
        at: null,
        silence: 'Transfer and payout are tried again until they succeed.',
      };
    default:
      return null;
  }
}

function dueOfRefund(deal: Deal): (Omit<Due, 'at'> & { at: Date | null }) | null {
  const refund = deal.refund ?? null;
  if (refund === null || refund.state === 'succeeded') return null;
  return {
    who: 'provider',
    act: 'Refund the buyer',
    at: null,
    silence: 'The refund is tried again until it succeeds.',
  };
}

/** What is due next, for whom, and what silence will mean. A freeze stops the clocks, so no moment is shown. */
export function dueOf(deal: Deal, now: Date): Due | null {
  const due = dueOfState(deal, now) ?? dueOfRefund(deal);
  if (due === null) return null;
  if (deal.frozenAt === null) return { ...due, at: due.at?.toISOString() ?? null };
  return {
    ...due,
    at: null,
    silence: 'The desk has frozen this deal: its clocks stand still until it lifts the freeze.',
  };
}
