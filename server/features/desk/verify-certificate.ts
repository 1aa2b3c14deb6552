import { EVIDENCE_GAP_LABELS } from '#shared/assay/evidence.ts';
import type { VerifyRequest } from '#shared/schemas/desk.ts';
import { InvalidError, invariant, type FieldError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { openLot } from '#server/features/lots/open-lot.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import type { Certificate } from '#server/models/certificate.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { gradeCase } from './case-evidence.ts';
import { claimsBeyondReport } from './compare-report.ts';
import { nameOfElement } from './element-words.ts';
import { figuresOf, lockClaimedCase, type LockedCase } from './lock-case.ts';
import { markExamined } from './mark-examined.ts';

export type Verified = { certificate: Certificate; grade: 'certified' | 'examined'; gaps: string[] };

const refusal = (pointer: string, code: string, message: string): FieldError => ({ pointer, code, message });

async function readLaboratory(id: string, unit: Unit): Promise<Laboratory> {
  const laboratory = await Laboratory.findByPk(id, { transaction: unit.tx });
  if (laboratory === null || !laboratory.isActive) {
    const message = 'Choose a laboratory that is active on the register';
    throw new InvalidError([refusal('/laboratoryId', 'laboratory-not-registered', message)]);
  }
  return laboratory;
}

/** The day it is for whoever is furthest ahead: nobody is refused for living east. */
function lastDayAnywhere(now: Date): string {
  return new Date(now.getTime() + 14 * 3_600_000).toISOString().slice(0, 10);
}

function checkConfirmation(input: VerifyRequest, certificate: Certificate, unit: Unit): void {
  const refuse = (message: string) =>
    new InvalidError([refusal('/confirmedOn', 'confirmation-date-wrong', message)]);
  if (input.confirmedOn > lastDayAnywhere(unit.now)) throw refuse('This day has not come yet');
  if (input.confirmedOn < certificate.issuedOn) throw refuse('This is before the report was issued');
}

async function checkFigures(certificate: Certificate, unit: Unit): Promise<void> {
  const claims = claimsBeyondReport(await figuresOf(certificate, unit));
  if (claims.length === 0) return;
  const names = claims.map(nameOfElement).join(', ');
  const message = `The lot claims more than the report gives: ${names}. Return it with this reason.`;
  throw new InvalidError([refusal('', 'claims-beyond-report', message)], message);
}

async function open({ certificate, lot }: LockedCase, unit: Unit, actor: Actor): Promise<void> {
  await openLot({ lot, grade: 'certified' }, unit, actor);
  if (lot.state !== 'open') return;
  invariant(lot.closesAt, 'an open lot closes on a day');
  await enqueueMail(
    {
      mail: 'lot-opened',
      memberId: lot.sellerId,
      uniqueKey: `lot-opened:${certificate.id}`,
      input: {
        lotCode: lot.code,
        lotTitle: lot.title ?? '',
        grade: 'certified',
        closesAt: lot.closesAt.toISOString(),
      },
    },
    unit,
  );
}

/**
 * Verifies a certificate that the desk has confirmed with its laboratory, and records how, with whom and when. The grade
 * follows by the engine's rule: `certified` opens the lot; with a gap it is `examined`, the lot stays submitted, and the
 * seller is told what is missing.
 *
 * Caller holds the lot; locks the certificate. Throws what `lockClaimedCase` throws, and `invalid-input`
 * (`laboratory-not-registered`, `confirmation-date-wrong`, `claims-beyond-report`), and what `openLot` throws.
 */
export async function verifyCertificate(
  { id, ...input }: VerifyRequest & { id: string },
  unit: Unit,
  actor: Actor,
): Promise<Verified> {
  const found = await lockClaimedCase({ id, version: input.version }, unit, actor);
  const { certificate, lot } = found;
  const laboratory = await readLaboratory(input.laboratoryId, unit);
  checkConfirmation(input, certificate, unit);
  await checkFigures(certificate, unit);
  const { confirmedHow, confirmedWith, confirmedOn, laboratoryId, isMarkSeen } = input;
  const confirmation = { confirmedHow, confirmedWith, confirmedOn, laboratoryId };
  const graded = gradeCase({ certificate, lot, laboratory, desk: 'verified', isMarkSeen });
  const gaps = graded.gaps.map((gap) => EVIDENCE_GAP_LABELS[gap]);
  const isCertified = graded.grade === 'certified';
  if (isCertified) {
    await certificate.update(
      {
        ...confirmation,
        state: 'verified',
        grade: 'certified',
        claimedById: null,
        claimedAt: null,
        decidedById: actor.id,
        decidedAt: unit.now,
        lockVersion: certificate.lockVersion + 1,
      },
      { transaction: unit.tx },
    );
    await open(found, unit, actor);
  } else {
    await markExamined(found, { note: gaps.join(' '), changes: confirmation }, unit, actor);
  }
  const grade = isCertified ? 'certified' : 'examined';
  const detail = { lot: lot.code, ...confirmation, isMarkSeen, laboratory: laboratory.name, grade, gaps };
  await recordAudit(
    { actor, act: 'verify-certificate', subjectKind: 'certificate', subjectId: id, detail },
    unit,
  );
  return { certificate, grade, gaps };
}
