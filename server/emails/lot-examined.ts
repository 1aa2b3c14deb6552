import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { lotMail, lotPath, reasonField } from './mail-text.ts';

const input = z.object({ ...lotMail, note: reasonField });

export const lotExamined = defineMail({
  audience: 'seller',
  trigger: 'the desk looked at the evidence but could not verify it as a certificate',
  says: 'what was looked at, and that such lots are not opened yet',
  input,
  write: ({ lotCode, lotTitle, note }) => ({
    subject: `Examined: ${lotTitle}`,
    heading: 'The desk has examined your evidence',
    paragraphs: [
      `The evidence for “${lotTitle}” was looked at: “${note}”`,
      'Only lots with a verified certificate open for now; yours stays with the desk, marked as examined.',
    ],
    facts: [{ label: 'Lot', value: lotCode }],
    action: { label: 'See the lot', path: lotPath(lotCode) },
    closing: [],
  }),
});
