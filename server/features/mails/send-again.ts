import { ConflictError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import type { Actor } from '#server/routing/define-route.ts';

/**
 * Takes a mail that was given up back into the outbox, with all its tries before it; to the address that the account has
 * now, as the old one may be why it failed. Its message id stays, so that a mail that did arrive is seen as the same.
 *
 * Locks the row. Throws `not-found`, `illegal-transition` for one that was not given up.
 */
export async function sendAgain(mailId: string, unit: Unit, actor: Actor): Promise<OutboxMail> {
  const mail = await OutboxMail.findByPk(mailId, { lock: unit.tx.LOCK.UPDATE, transaction: unit.tx });
  if (mail === null) throw new NotFoundError();
  if (mail.state !== 'dead') {
    throw new ConflictError('illegal-transition', 'Only a mail that was given up is sent again.');
  }
  const member =
    mail.memberId === null ? null : await Member.findByPk(mail.memberId, { transaction: unit.tx });
  const { tries, lastError } = mail;
  await mail.update(
    {
      state: 'due',
      tries: 0,
      nextAt: unit.now,
      leaseUntil: null,
      recipient: member?.email ?? mail.recipient,
    },
    { transaction: unit.tx },
  );
  const detail = { mail: mail.mail, memberId: mail.memberId, tries, lastError };
  await recordAudit({ actor, act: 'send-mail-again', subjectKind: 'mail', subjectId: mail.id, detail }, unit);
  return mail;
}
