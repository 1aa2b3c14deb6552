import { HOLDING_DEAL_STATES, isDealEnded } from '#shared/deal-states.ts';
import { isDeskStaff, type Role } from '#shared/roles.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Parcel } from '#server/models/parcel.ts';

type Who = { id: string; role: Role };
export type DealSide = 'buyer' | 'seller' | 'desk';
/** A deal with what the rules look at. */
export type JudgedDeal = Pick<
  Deal,
  'buyerId' | 'sellerId' | 'state' | 'fundBy' | 'shipBy' | 'arriveBy' | 'inspectBy' | 'frozenAt' | 'fundedAt'
> & { parcel?: Pick<Parcel, 'trackerStatus' | 'deliveredAt' | 'isSigned'> | null; receipt?: unknown };

/** How somebody stands to a deal; null: it is not visible. A side that works at the desk stays a side. */
export function sideOf(actor: Who, deal: Pick<Deal, 'buyerId' | 'sellerId'>): DealSide | null {
  if (actor.id === deal.buyerId) return 'buyer';
  if (actor.id === deal.sellerId) return 'seller';
  return isDeskStaff(actor.role) ? 'desk' : null;
}

export function isOwnCase(actor: Who, deal: Pick<Deal, 'buyerId' | 'sellerId'>): boolean {
  return actor.id === deal.buyerId || actor.id === deal.sellerId;
}

function isPast(moment: Date | null, now: Date): boolean {
  return moment !== null && moment.getTime() <= now.getTime();
}

/** A parcel counts as not arrived when its time has passed, or the carrier itself says that it is lost or went back. */
export function isOverdueOrLost(deal: JudgedDeal, now: Date): boolean {
  return isPast(deal.arriveBy, now) || ['lost', 'returned'].includes(deal.parcel?.trackerStatus ?? '');
}

/** The buyer's days to inspect have passed without a word. */
export function isInspectionOver(deal: JudgedDeal, now: Date): boolean {
  return deal.state === 'delivered' && isPast(deal.inspectBy, now);
}

/** The carrier says delivered, but nobody signed: it waits for the buyer's word. */
export function isUnsignedDelivery(deal: JudgedDeal): boolean {
  const parcel = deal.parcel ?? null;
  return (
    deal.state === 'shipped' && parcel !== null && parcel.deliveredAt !== null && parcel.isSigned === false
  );
}

function hasReceipt(deal: JudgedDeal): boolean {
  return (deal.receipt ?? null) !== null;
}

export type DealAction =
  | 'pay'
  | 'ship'
  | 'confirmDelivery'
  | 'recordReceipt'
  | 'accept'
  | 'contest'
  | 'rule'
  | 'takeUp'
  | 'freeze'
  | 'unfreeze';

type Rule = (deal: JudgedDeal, now: Date) => boolean;

const BUYER_RULES: Partial<Record<DealAction, Rule>> = {
  pay: (deal, now) => deal.state === 'agreed' && !isPast(deal.fundBy, now),
  confirmDelivery: (deal) => isUnsignedDelivery(deal) && deal.frozenAt === null,
  recordReceipt: (deal) => deal.state === 'delivered' && !hasReceipt(deal),
  accept: (deal) => deal.state === 'delivered' && hasReceipt(deal) && deal.frozenAt === null,
  contest: (deal, now) =>
    deal.frozenAt === null &&
    (deal.state === 'delivered' || (deal.state === 'shipped' && isOverdueOrLost(deal, now))),
};

const SELLER_RULES: Partial<Record<DealAction, Rule>> = {
  ship: (deal, now) => deal.state === 'funded' && deal.frozenAt === null && !isPast(deal.shipBy, now),
};

const DESK_RULES: Partial<Record<DealAction, Rule>> = {
  rule: (deal) => deal.state === 'contested' && deal.frozenAt === null,
  takeUp: (deal, now) => isInspectionOver(deal, now) && deal.frozenAt === null,
  freeze: (deal) => deal.frozenAt === null && HOLDING_DEAL_STATES.includes(deal.state),
  unfreeze: (deal) => deal.frozenAt !== null && !isDealEnded(deal.state),
};

const RULES_OF_SIDE = { buyer: BUYER_RULES, seller: SELLER_RULES, desk: DESK_RULES } as const;

/** May this actor do this now? No rule means no. Staff have no desk's rights on a deal of their own. */
export function canDo(actor: Who, action: DealAction, deal: JudgedDeal, now: Date): boolean {
  const side = sideOf(actor, deal);
  return side !== null && (RULES_OF_SIDE[side][action]?.(deal, now) ?? false);
}
