import type { DeadMailRow } from '#shared/schemas/admin.ts';
import type { OutboxMail } from '#server/models/outbox-mail.ts';

/** A given-up mail as an admin sees it; the mail's input stays out, since it carries names and addresses. */
export function presentDeadMail(mail: OutboxMail, names: ReadonlyMap<string, string>): DeadMailRow {
  const displayName = mail.memberId === null ? undefined : names.get(mail.memberId);
  return {
    id: mail.id,
    mail: mail.mail,
    member: mail.memberId === null || displayName === undefined ? null : { id: mail.memberId, displayName },
    recipient: mail.recipient,
    tries: mail.tries,
    lastError: mail.lastError,
    orderedAt: mail.createdAt.toISOString(),
    // Nothing touches a mail that was given up, so its last change is when that happened.
    deadSince: mail.updatedAt.toISOString(),
  };
}
