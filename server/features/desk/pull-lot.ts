import { ConflictError, ForbiddenError, NotFoundError } from '#server/app-error.ts';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canPull, isOwnCase } from './case-policy.ts';

/** Nobody needs to decide any more on the report of a lot that is gone. */
async function dropFromQueue(lotId: string, unit: Unit): Promise<void> {
  await Certificate.update(
    {
      state: 'superseded',
      claimedById: null,
      claimedAt: null,
      lockVersion: sequelize.literal('lock_version + 1') as unknown as number,
    },
    { where: { lotId, state: ['submitted', 'claimed'] }, transaction: unit.tx },
  );
}

/**
 * Takes a lot out of the market with a reason that the seller reads in its history and in a mail. Not while a deal runs
 * over it: there the desk rules on the deal.
 *
 * Caller holds the lot. Throws `not-found`, `own-case`, `illegal-transition`.
 */
export async function pullLot(
  { lotId, reason }: { lotId: string; reason: string },
  unit: Unit,
  actor: Actor,
): Promise<Lot> {
  const lot = await Lot.findByPk(lotId, { transaction: unit.tx });
  if (lot === null || lot.state === 'draft') throw new NotFoundError();
  if (isOwnCase(actor, lot)) throw new ForbiddenError('own-case');
  const running = await Deal.count({ where: { liveLotId: lotId }, transaction: unit.tx });
  if (running > 0) throw new ConflictError('illegal-transition', 'A deal runs over this lot.');
  if (!canPull(actor, lot))
    throw new ConflictError('illegal-transition', 'A lot in this state cannot be pulled.');
  await dropFromQueue(lotId, unit);
  await moveLot(
    lot,
    'withdrawn',
    {
      act: 'pulled',
      actorKind: 'desk',
      actorId: actor.id,
      detail: { reason },
      changes: { pulledByDesk: true, stateReason: reason },
    },
    unit,
  );
  await enqueueMail(
    {
      mail: 'lot-pulled',
      memberId: lot.sellerId,
      uniqueKey: `lot-pulled:${lot.id}`,
      input: { lotCode: lot.code, lotTitle: lot.title ?? '', reason },
    },
    unit,
  );
  await recordAudit(
    { actor, act: 'pull-lot', subjectKind: 'lot', subjectId: lot.code, detail: { reason } },
    unit,
  );
  return lot;
}
