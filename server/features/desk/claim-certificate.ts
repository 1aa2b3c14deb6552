import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canOnCase } from './case-policy.ts';
import { lockCase } from './lock-case.ts';

/**
 * Takes a waiting certificate, so that one of the desk works on it and nobody else decides. Asking again for what is held
 * already changes nothing.
 *
 * Caller holds the lot; locks the certificate. Throws `not-found`, `own-case`, `certificate-claimed`, `illegal-transition`.
 */
export async function claimCertificate(id: string, unit: Unit, actor: Actor): Promise<Certificate> {
  const { certificate, lot } = await lockCase(id, unit, actor);
  if (certificate.state === 'claimed') {
    if (certificate.claimedById === actor.id) return certificate;
    throw new ConflictError('certificate-claimed');
  }
  if (!canOnCase(actor, 'claim', { certificate, lot }))
    throw new ConflictError('illegal-transition', 'This certificate waits for no decision any more.');
  await certificate.update(
    {
      state: 'claimed',
      claimedById: actor.id,
      claimedAt: unit.now,
      lockVersion: certificate.lockVersion + 1,
    },
    { transaction: unit.tx },
  );
  await recordAudit(
    { actor, act: 'claim-certificate', subjectKind: 'certificate', subjectId: id, detail: { lot: lot.code } },
    unit,
  );
  return certificate;
}
