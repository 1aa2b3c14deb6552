import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { draftPath, lotMail, reasonField } from './mail-text.ts';

const input = z.object({ ...lotMail, reason: reasonField });

export const lotReturned = defineMail({
  audience: 'seller',
  trigger: 'the desk returned the lot',
  says: 'the reason, and where to mend it',
  input,
  write: ({ lotCode, lotTitle, reason }) => ({
    subject: `Returned by the desk: ${lotTitle}`,
    heading: 'The desk has returned your lot',
    paragraphs: [`“${lotTitle}” was not opened. The desk’s reason: “${reason}”`],
    facts: [{ label: 'Lot', value: lotCode }],
    action: { label: 'Change and submit it again', path: draftPath(lotCode) },
    closing: ['Nothing that you entered is lost.'],
  }),
});
