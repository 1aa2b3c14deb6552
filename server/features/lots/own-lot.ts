import { ForbiddenError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canSeeLot, isSeller } from './lot-policy.ts';

/** The lot behind a public code, for taking its lock; what may be done with it is asked again under the lock. */
export async function lotIdOf(code: string): Promise<string> {
  const lot = await Lot.findOne({ where: { code }, attributes: ['id'] });
  if (lot === null) throw new NotFoundError();
  return lot.id;
}

/**
 * Reads the seller's own lot in a transaction that holds its lock.
 * Throws `not-found` where the actor may not even see it, `forbidden` where it is another's, `member-suspended`.
 */
export async function readOwnLot(lotId: string, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null) throw new NotFoundError();
  if (!isSeller(actor, lot)) {
    if (!canSeeLot(actor, lot)) throw new NotFoundError();
    throw new ForbiddenError();
  }
  if (actor.suspendedAt !== null) throw new ForbiddenError('member-suspended');
  return lot;
}
