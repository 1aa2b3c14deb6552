import type { Unit } from '#server/database/transaction.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

const LEASE_SECONDS = 120;

/**
 * Takes a mail for sending, committed before anything is sent: the token tells this sender from one whose lease ran out.
 * Answers null when another has it or it is done. Locks the row.
 */
export async function claimMail(id: string, unit: Unit): Promise<OutboxMail | null> {
  const mail = await OutboxMail.findByPk(id, { lock: unit.tx.LOCK.UPDATE, transaction: unit.tx });
  if (mail === null) return null;
  const isFree =
    (mail.state === 'due' && mail.nextAt <= unit.now) ||
    (mail.state === 'claimed' && mail.leaseUntil !== null && mail.leaseUntil <= unit.now);
  if (!isFree) return null;
  return mail.update(
    {
      state: 'claimed',
      leaseToken: mail.leaseToken + 1,
      leaseUntil: new Date(unit.now.getTime() + LEASE_SECONDS * 1000),
      tries: mail.tries + 1,
    },
    { transaction: unit.tx },
  );
}
