import type { Unit } from '#server/database/transaction.ts';
import { openLot } from '#server/features/lots/open-lot.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import type { Actor } from '#server/routing/define-route.ts';
import type { LockedCase } from './lock-case.ts';

type Finding = {
  /** What was looked at, or what is missing for a certificate; the seller reads it. */
  note: string;
  changes?: Parameters<LockedCase['certificate']['update']>[0];
};

/** The evidence was looked at and is not a verified certificate: the lot is marked and stays where it is. */
export async function markExamined(
  { certificate, lot }: LockedCase,
  { note, changes }: Finding,
  unit: Unit,
  actor: Actor,
): Promise<void> {
  const lockVersion = certificate.lockVersion + 1;
  await certificate.update(
    {
      ...changes,
      state: 'examined',
      grade: 'examined',
      claimedById: null,
      claimedAt: null,
      decidedById: actor.id,
      decidedAt: unit.now,
      lockVersion,
    },
    { transaction: unit.tx },
  );
  await openLot({ lot, grade: 'examined', detail: { reason: note } }, unit, actor);
  await enqueueMail(
    {
      mail: 'lot-examined',
      memberId: lot.sellerId,
      uniqueKey: `lot-examined:${certificate.id}:${lockVersion}`,
      input: { lotCode: lot.code, lotTitle: lot.title ?? '', note },
    },
    unit,
  );
}
