import { withTransaction } from '#server/database/transaction.ts';
import { claimMail } from '#server/features/mails/claim-mail.ts';
import { composeMail } from '#server/features/mails/compose-mail.ts';
import { endMail, type MailResult } from '#server/features/mails/end-mail.ts';
import { findDueMails } from '#server/features/mails/mail-queries.ts';
import { mailer } from '#server/integrations/clients.ts';
import { MailServiceError } from '#server/integrations/mail.ts';
import type { OutboxMail } from '#server/models/outbox-mail.ts';
import { defineJob, type JobContext } from './run-job.ts';

const MAILS_MAX = 100;

async function send(mail: OutboxMail): Promise<MailResult> {
  try {
    await mailer().sendMail(await composeMail(mail));
    return { kind: 'accepted' };
  } catch (error) {
    const isWorthRetry = !(error instanceof MailServiceError) || error.isWorthRetry;
    return { kind: 'failed', message: error instanceof Error ? error.message : String(error), isWorthRetry };
  }
}

/** Claims, sends and writes down, mail by mail: the claim and the outcome are transactions, the sending is in neither. */
export async function sendMails({ now, log }: JobContext): Promise<Record<string, unknown>> {
  const counts: Record<string, number> = {};
  for (const { id } of await findDueMails(now, MAILS_MAX)) {
    const mail = await withTransaction({}, (unit) => claimMail(id, unit));
    if (mail === null) continue;
    const result = await send(mail);
    if (result.kind === 'failed')
      log.warn({ mail: mail.mail, id, reason: result.message }, 'mail not accepted');
    const { leaseToken } = mail;
    const state = await withTransaction({}, (unit) => endMail({ id, leaseToken, result }, unit));
    counts[state] = (counts[state] ?? 0) + 1;
  }
  return counts;
}

export const sendMailsJob = defineJob({ name: 'send-mails', everySeconds: 5, run: sendMails });
