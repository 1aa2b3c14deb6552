import { isDealEnded } from '#shared/deal-states.ts';
import { canLotBecome, PUBLIC_LOT_STATES, type LotState } from '#shared/lot-states.ts';
import { isDeskStaff } from '#shared/roles.ts';
import type { Actor } from '#server/routing/define-route.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Lot } from '#server/models/lot.ts';

type LotRow = Pick<Lot, 'sellerId' | 'state' | 'assayVersion'> &
  Partial<Pick<Lot, 'floorPercent' | 'pricingBasis'>>;
type Viewer = Pick<Actor, 'id' | 'role' | 'suspendedAt'> | null;

export function isSeller(viewer: Viewer, lot: Pick<Lot, 'sellerId'>): boolean {
  return viewer !== null && viewer.id === lot.sellerId;
}

/** Open, reserved and sold lots are anyone's to see; the others are the seller's, the desk's and the buyer's of its deal. */
export function canSeeLot(viewer: Viewer, lot: LotRow, isBuyer = false): boolean {
  if (PUBLIC_LOT_STATES.includes(lot.state) || isSeller(viewer, lot) || isBuyer) return true;
  return viewer !== null && isDeskStaff(viewer.role) && lot.state !== 'draft';
}

/** Laboratories report on cases and do nothing else here. */
export function canDraftLots(viewer: Viewer): boolean {
  return viewer !== null && viewer.role !== 'lab' && viewer.suspendedAt === null;
}

export type LotRights = Record<
  | 'edit'
  | 'submit'
  | 'redraft'
  | 'changePrice'
  | 'withdraw'
  | 'pause'
  | 'reopen'
  | 'copy'
  | 'buy'
  | 'fixPrice'
  | 'giveUpFix'
  | 'pull',
  boolean
>;

const PULLABLE: readonly LotState[] = ['submitted', 'open', 'paused'];

/** How a lot stands beside its own row. */
export type LotStanding = { isSellerSuspended: boolean; isPriceWaiting: boolean; holdsFix: boolean };

/** What a viewer may do with a lot as it stands; the commands ask the same questions again. */
export function lotRights(viewer: Viewer, lot: LotRow, standing: LotStanding): LotRights {
  const isOwn = isSeller(viewer, lot);
  const mayChange = isOwn && canDraftLots(viewer);
  const { isSellerSuspended, isPriceWaiting, holdsFix } = standing;
  const mayBuy =
    viewer !== null && viewer.role !== 'lab' && viewer.suspendedAt === null && !isOwn && !isSellerSuspended;
  const isLinked = lot.pricingBasis === 'linked';
  return {
    edit: mayChange && lot.state === 'draft',
    submit: mayChange && lot.state === 'draft',
    redraft: mayChange && lot.state === 'returned',
    changePrice:
      mayChange && (lot.state === 'open' || (lot.state === 'paused' && typeof lot.floorPercent === 'string')),
    withdraw: mayChange && canLotBecome(lot.state, 'withdrawn'),
    pause: mayChange && lot.state === 'open',
    reopen: mayChange && lot.state === 'paused',
    copy: mayChange && lot.state !== 'draft',
    buy: mayBuy && (isLinked ? lot.state === 'reserved' && holdsFix : lot.state === 'open'),
    fixPrice: mayBuy && isLinked && lot.state === 'open' && !isPriceWaiting,
    giveUpFix: holdsFix,
    pull: viewer !== null && isDeskStaff(viewer.role) && !isOwn && PULLABLE.includes(lot.state),
  };
}

/** A draft that the desk has never seen leaves nothing behind; what it has seen keeps its history. */
export function canDeleteDraft(viewer: Viewer, lot: LotRow): boolean {
  return isSeller(viewer, lot) && lot.state === 'draft' && lot.assayVersion === 0;
}

/**
 * A report carries its customer's name and address, so the document is for the seller, the desk, and the buyer while his
 * money is held or has been paid out: not before funding, and no more once the deal has ended without the lot. Staff who
 * are a side of a deal are that side.
 */
export function canReadDocument(
  viewer: Viewer,
  lot: Pick<Lot, 'sellerId'>,
  deal: Pick<Deal, 'buyerId' | 'fundedAt' | 'state'> | null,
): boolean {
  if (viewer === null) return false;
  if (isSeller(viewer, lot)) return true;
  if (deal !== null && deal.buyerId === viewer.id) return deal.fundedAt !== null && !isDealEnded(deal.state);
  return isDeskStaff(viewer.role);
}
