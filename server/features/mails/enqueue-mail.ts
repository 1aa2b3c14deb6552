import { invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { mailDefinition, type MailInput, type MailName } from '#server/emails/mails.ts';
import { Member } from '#server/models/member.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

export type MailOrder<Name extends MailName> = {
  mail: Name;
  memberId: string;
  /** The deal that it tells of: its mails reach a reader in their order. */
  dealId?: string;
  /** Names the mail for ever: the same key is never mailed twice. Such as `deal-funded:<deal id>:seller`. */
  uniqueKey: string;
  input: MailInput<Name>;
};

/**
 * Puts a mail into the outbox, in the transaction of what it tells of; the job sends it after commit. A key that is there
 * already is left as it is. The input is checked here, so that a mail that cannot be written fails where it was ordered.
 */
export async function enqueueMail<Name extends MailName>(order: MailOrder<Name>, unit: Unit): Promise<void> {
  const input: unknown = mailDefinition(order.mail).input.parse(order.input);
  const known = await OutboxMail.findOne({
    where: { uniqueKey: order.uniqueKey },
    attributes: ['id'],
    transaction: unit.tx,
  });
  if (known !== null) return;
  const member = await Member.findByPk(order.memberId, { transaction: unit.tx });
  invariant(member !== null, 'a mail is for a member');
  await OutboxMail.create(
    {
      id: newId(),
      mail: order.mail,
      memberId: member.id,
      dealId: order.dealId ?? null,
      recipient: member.email,
      uniqueKey: order.uniqueKey,
      input,
      state: 'due',
      nextAt: unit.now,
    },
    { transaction: unit.tx },
  );
}
