import type { ExamineRequest } from '#shared/schemas/desk.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { lockClaimedCase } from './lock-case.ts';
import { markExamined } from './mark-examined.ts';

/**
 * Records that the desk looked at evidence which is no verified certificate. The lot stays submitted, marked examined; the
 * seller reads the note in its history and in a mail.
 *
 * Caller holds the lot; locks the certificate. Throws what `lockClaimedCase` throws.
 */
export async function examineCertificate(
  { id, version, note }: ExamineRequest & { id: string },
  unit: Unit,
  actor: Actor,
): Promise<Certificate> {
  const found = await lockClaimedCase({ id, version }, unit, actor);
  await markExamined(found, { note }, unit, actor);
  const detail = { lot: found.lot.code, note };
  await recordAudit(
    { actor, act: 'examine-certificate', subjectKind: 'certificate', subjectId: id, detail },
    unit,
  );
  return found.certificate;
}
