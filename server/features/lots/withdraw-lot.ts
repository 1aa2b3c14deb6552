import type { Unit } from '#server/database/transaction.ts';
import { Certificate } from '#server/models/certificate.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from './move-lot.ts';
import { readOwnLot } from './own-lot.ts';

/**
 * Takes a lot off for good; its certificate is free for another lot, and a case still waiting leaves the desk's queue.
 * Expects the lot's lock. Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition` (a reserved lot has a
 * buyer, a sold one an owner).
 */
export async function withdrawLot(
  { lotId, reason }: { lotId: string; reason: string },
  unit: Unit,
  actor: Actor,
): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  const who = { actorKind: 'seller', actorId: actor.id } as const;
  const changes = { stateReason: reason };
  await moveLot(lot, 'withdrawn', { act: 'withdrawn', ...who, detail: { reason }, changes }, unit);
  await Certificate.update(
    { state: 'superseded' },
    { where: { lotId, state: ['submitted', 'claimed'] }, transaction: unit.tx },
  );
  return lot;
}
