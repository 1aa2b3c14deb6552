import { AppError, ConflictError, ForbiddenError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { isOwnCase, sideOf, type DealSide } from './deal-policy.ts';
import { loadDeal } from './deal-queries.ts';

/**
 * Reads a deal, under its lock, for an act of one of its sides.
 * Throws `not-found` where the actor may not see it, `forbidden` where the act belongs to the other side, `deal-frozen`.
 */
export async function readDealFor(
  side: 'buyer' | 'seller',
  dealId: string,
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const deal = await loadDeal(dealId, unit.tx);
  const stands: DealSide | null = sideOf(actor, deal);
  if (stands === null) throw new NotFoundError();
  if (stands !== side) throw new ForbiddenError();
  return deal;
}

/** Reads a deal for whoever may see it: its sides and the desk. Throws `not-found`. */
export async function readVisibleDeal(dealId: string, actor: Actor): Promise<Deal> {
  const deal = await loadDeal(dealId);
  if (sideOf(actor, deal) === null) throw new NotFoundError();
  return deal;
}

/** Reads a deal, under its lock, for an act of the desk. Throws `not-found`, `own-case`. */
export async function readDealForDesk(dealId: string, unit: Unit, actor: Actor): Promise<Deal> {
  const deal = await loadDeal(dealId, unit.tx);
  if (isOwnCase(actor, deal)) throw new AppError('own-case');
  if (sideOf(actor, deal) !== 'desk') throw new NotFoundError();
  return deal;
}

/** Refuses an act on a frozen deal. Throws `deal-frozen`. */
export function assertNotFrozen(deal: Deal): void {
  if (deal.frozenAt !== null) throw new ConflictError('deal-frozen');
}

/** Refuses an act in a state that does not allow it. Throws `illegal-transition`. */
export function assertState(deal: Deal, states: readonly Deal['state'][], detail?: string): void {
  if (!states.includes(deal.state)) throw new ConflictError('illegal-transition', detail);
}
