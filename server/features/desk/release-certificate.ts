import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canOnCase } from './case-policy.ts';
import { lockCase } from './lock-case.ts';

/**
 * Gives a claim back, so that a colleague can take it; an admin can also give back the claim of somebody who is away.
 *
 * Caller holds the lot; locks the certificate. Throws `not-found`, `own-case`, `certificate-not-claimed`,
 * `certificate-claimed`.
 */
export async function releaseCertificate(id: string, unit: Unit, actor: Actor): Promise<Certificate> {
  const { certificate, lot } = await lockCase(id, unit, actor);
  if (certificate.state !== 'claimed') throw new ConflictError('certificate-not-claimed');
  if (!canOnCase(actor, 'release', { certificate, lot })) throw new ConflictError('certificate-claimed');
  const claimedBy = certificate.claimedById;
  await certificate.update(
    {
      state: certificate.grade === 'examined' ? 'examined' : 'submitted',
      claimedById: null,
      claimedAt: null,
      lockVersion: certificate.lockVersion + 1,
    },
    { transaction: unit.tx },
  );
  const detail = { lot: lot.code, claimedBy };
  await recordAudit(
    { actor, act: 'release-certificate', subjectKind: 'certificate', subjectId: id, detail },
    unit,
  );
  return certificate;
}
