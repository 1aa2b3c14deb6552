import { createHash } from 'node:crypto';
import { invariant } from '#server/app-error.ts';
import { env } from '#server/env.ts';
import type { SheetAttachment } from '#server/emails/define-mail.ts';
import { isMailName, mailDefinition } from '#server/emails/mails.ts';
import { renderMail } from '#server/emails/render-mail.ts';
import { findDealIds, loadDealView } from '#server/features/deals/deal-queries.ts';
import { sheetFor } from '#server/features/deals/deal-sheets.ts';
import { renderSheetPdf } from '#server/features/sheets/sheet-pdf.ts';
import type { MailAttachment, OutgoingMail } from '#server/integrations/mail.ts';
import { Member } from '#server/models/member.ts';
import type { OutboxMail } from '#server/models/outbox-mail.ts';

/** Derived from the unique key, so that a mail sent twice after a lost answer is recognised as one. */
export function messageIdOf(uniqueKey: string): string {
  const local = createHash('sha256').update(uniqueKey).digest('hex').slice(0, 40);
  return `<${local}@${new URL(env.PUBLIC_URL).hostname}>`;
}

async function sheetAttachment(
  { dealCode, audience }: SheetAttachment,
  timeZone: string,
): Promise<MailAttachment> {
  const { deal, final, provisional } = await loadDealView((await findDealIds(dealCode)).id);
  const sheet = sheetFor(audience, final ?? provisional);
  return {
    filename: `scruple-${dealCode}-${sheet.moment}.pdf`,
    contentType: 'application/pdf',
    content: await renderSheetPdf({
      sheet,
      dealCode,
      lotCode: deal.lot.code,
      lotTitle: deal.lot.title ?? '',
      timeZone,
    }),
  };
}

/** The mail as it goes out, written from its stored input in the language of its reader's clock. */
export async function composeMail(row: OutboxMail): Promise<OutgoingMail> {
  invariant(isMailName(row.mail), `the mail ${row.mail} is known`);
  const definition = mailDefinition(row.mail);
  const member = row.memberId === null ? null : await Member.findByPk(row.memberId);
  const reader = { displayName: member?.displayName ?? '', timeZone: member?.timeZone ?? 'UTC' };
  const input: unknown = definition.input.parse(row.input);
  const attachment = definition.attach?.(input);
  return {
    to: row.recipient,
    ...renderMail(definition.write(input, reader), reader, env.PUBLIC_URL),
    attachments: attachment === undefined ? [] : [await sheetAttachment(attachment, reader.timeZone)],
    messageId: messageIdOf(row.uniqueKey),
  };
}
