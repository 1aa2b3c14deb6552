import type { Unit } from '#server/database/transaction.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';

export type MailResult = { kind: 'accepted' } | { kind: 'failed'; message: string; isWorthRetry: boolean };

/** After so many tries a mail is given up and shown to an admin; together the waits make about two and a half days. */
export const MAIL_TRIES_MAX = 12;
const FIRST_WAIT_SECONDS = 30;
const LONGEST_WAIT_SECONDS = 12 * 3600;

/** Doubles from half a minute to half a day. */
export function waitSecondsAfter(tries: number): number {
  return Math.min(FIRST_WAIT_SECONDS * 2 ** (tries - 1), LONGEST_WAIT_SECONDS);
}

/**
 * Writes down how the sending went. A sender whose lease was taken over meanwhile changes nothing. Locks the row; answers
 * the state that the mail is in now.
 */
export async function endMail(
  { id, leaseToken, result }: { id: string; leaseToken: number; result: MailResult },
  unit: Unit,
): Promise<OutboxMail['state'] | 'taken-over'> {
  const mail = await OutboxMail.findByPk(id, { lock: unit.tx.LOCK.UPDATE, transaction: unit.tx });
  if (mail === null || mail.state !== 'claimed' || mail.leaseToken !== leaseToken) return 'taken-over';
  if (result.kind === 'accepted') {
    await mail.update(
      { state: 'sent', leaseUntil: null, acceptedAt: unit.now, lastError: null },
      { transaction: unit.tx },
    );
    return 'sent';
  }
  const isOver = !result.isWorthRetry || mail.tries >= MAIL_TRIES_MAX;
  await mail.update(
    {
      state: isOver ? 'dead' : 'due',
      leaseUntil: null,
      nextAt: new Date(unit.now.getTime() + waitSecondsAfter(mail.tries) * 1000),
      lastError: result.message.slice(0, 500),
    },
    { transaction: unit.tx },
  );
  return isOver ? 'dead' : 'due';
}
