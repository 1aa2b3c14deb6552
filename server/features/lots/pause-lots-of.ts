import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from './move-lot.ts';

export const SUSPENDED_NOTE = 'The account is suspended.';

/**
 * Takes every open lot of a member whose account is suspended off the register, with a dated entry in each lot's history.
 * They come back one by one, when the member can act again and reopens them. Expects the member's lock and takes those of
 * the lots, by ascending id. Answers the codes of the lots.
 */
export async function pauseLotsOf(
  { memberId }: { memberId: string },
  unit: Unit,
  actor: Pick<Actor, 'id'>,
): Promise<string[]> {
  const lots = await Lot.findAll({
    where: { sellerId: memberId, state: 'open' },
    order: [['id', 'ASC']],
    lock: unit.tx.LOCK.UPDATE,
    transaction: unit.tx,
  });
  const who = { actorKind: 'desk', actorId: actor.id, detail: { reason: SUSPENDED_NOTE } } as const;
  for (const lot of lots) {
    const changes = { lockVersion: lot.lockVersion + 1 };
    await moveLot(lot, 'paused', { act: 'paused', ...who, changes }, unit);
  }
  return lots.map(({ code }) => code);
}

/** True while a lot's seller is suspended; the account stays as it is until this transaction ends. */
export async function isSellerSuspended(lot: Pick<Lot, 'sellerId'>, { tx }: Unit): Promise<boolean> {
  const seller = await Member.findByPk(lot.sellerId, {
    attributes: ['id', 'suspendedAt'],
    lock: tx.LOCK.SHARE,
    transaction: tx,
  });
  return seller !== null && seller.suspendedAt !== null;
}
