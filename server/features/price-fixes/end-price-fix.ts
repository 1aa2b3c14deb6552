import { ConflictError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { isSellerSuspended, SUSPENDED_NOTE } from '#server/features/lots/pause-lots-of.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { Lot } from '#server/models/lot.ts';
import type { PriceFix } from '#server/models/price-fix.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { openFixOf } from './price-fix-queries.ts';

const FREED = { openMemberId: null, openLotId: null } as const;

/** Ends the fix by its purchase; the lot stays reserved, now for the deal. Expects the lot's lock. */
export async function useFix(fix: PriceFix, dealId: string, unit: Unit): Promise<void> {
  await fix.update({ state: 'used', dealId, endedAt: unit.now, ...FREED }, { transaction: unit.tx });
}

type Ending = { fix: PriceFix; state: 'ran_out' | 'given_up'; actorId: string | null };

/** Puts the lot of a fix back to open, or to paused while its seller is suspended. Expects the lot's lock. */
async function freeLot({ fix, state, actorId }: Ending, unit: Unit): Promise<void> {
  await fix.update({ state, endedAt: unit.now, ...FREED }, { transaction: unit.tx });
  const lot = await Lot.findByPk(fix.lotId, { transaction: unit.tx, rejectOnEmpty: true });
  const act = state === 'ran_out' ? 'fix-ran-out' : 'fix-given-up';
  const actorKind = actorId === null ? 'house' : 'buyer';
  await moveLot(lot, 'open', { act, actorKind, actorId }, unit);
  if (!(await isSellerSuspended(lot, unit))) return;
  const detail = { reason: SUSPENDED_NOTE };
  await moveLot(lot, 'paused', { act: 'paused', actorKind: 'house', detail }, unit);
}

/**
 * Ends a price fix whose time is over, and offers its lot again; answers whether it did. A fix that was used or given up
 * meanwhile is left alone, so any number of runners end it once. Expects the lot's lock.
 */
export async function endPastFix({ lotId }: { lotId: string }, unit: Unit): Promise<boolean> {
  const fix = await openFixOf(lotId, unit.tx);
  if (fix === null || unit.now < fix.fixedUntil) return false;
  await freeLot({ fix, state: 'ran_out', actorId: null }, unit);
  return true;
}

/**
 * Gives up the actor's own price fix before its time; the lot is offered again. Expects the lot's lock.
 * Throws `price-fix-ended` where he holds none over this lot.
 */
export async function giveUpPriceFix({ lotId }: { lotId: string }, unit: Unit, actor: Actor): Promise<void> {
  const fix = await openFixOf(lotId, unit.tx);
  if (fix === null || fix.memberId !== actor.id) throw new ConflictError('price-fix-ended');
  invariant(fix.state === 'open', 'an open fix is found by its open lot');
  const isPast = unit.now >= fix.fixedUntil;
  await freeLot({ fix, state: isPast ? 'ran_out' : 'given_up', actorId: isPast ? null : actor.id }, unit);
}
