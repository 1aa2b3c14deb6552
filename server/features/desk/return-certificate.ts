import type { ReturnRequest } from '#shared/schemas/desk.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { lockClaimedCase } from './lock-case.ts';

/**
 * Returns a lot to its seller with a reason: the certificate is decided and no longer stands in another lot's way, the lot
 * can be drafted again, the seller reads the reason in its history and in a mail.
 *
 * Caller holds the lot; locks the certificate. Throws what `lockClaimedCase` throws.
 */
export async function returnCertificate(
  { id, version, reason }: ReturnRequest & { id: string },
  unit: Unit,
  actor: Actor,
): Promise<Certificate> {
  const { certificate, lot } = await lockClaimedCase({ id, version }, unit, actor);
  await certificate.update(
    {
      state: 'returned',
      grade: null,
      returnReason: reason,
      claimedById: null,
      claimedAt: null,
      decidedById: actor.id,
      decidedAt: unit.now,
      lockVersion: certificate.lockVersion + 1,
    },
    { transaction: unit.tx },
  );
  const changes = { stateReason: reason, evidenceGrade: 'declared' } as const;
  await moveLot(
    lot,
    'returned',
    { act: 'returned', actorKind: 'desk', actorId: actor.id, detail: { reason }, changes },
    unit,
  );
  await enqueueMail(
    {
      mail: 'lot-returned',
      memberId: lot.sellerId,
      uniqueKey: `lot-returned:${id}`,
      input: { lotCode: lot.code, lotTitle: lot.title ?? '', reason },
    },
    unit,
  );
  const detail = { lot: lot.code, reason };
  await recordAudit(
    { actor, act: 'return-certificate', subjectKind: 'certificate', subjectId: id, detail },
    unit,
  );
  return certificate;
}
