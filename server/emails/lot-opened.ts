import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { instantField, lotMail, lotPath, momentText } from './mail-text.ts';

const input = z.object({
  ...lotMail,
  grade: z.enum(['certified', 'examined', 'declared']),
  closesAt: instantField,
});

export const lotOpened = defineMail({
  audience: 'seller',
  trigger: 'the desk verified the certificate and the lot opened',
  says: 'the grade, and until when the lot is open',
  input,
  write: ({ lotCode, lotTitle, grade, closesAt }, { timeZone }) => ({
    subject: `Verified and open: ${lotTitle}`,
    heading: 'Your lot is open',
    paragraphs: [
      `The desk compared the certificate of “${lotTitle}” and confirmed it with the laboratory. The metal itself was not tested by Scruple.`,
    ],
    facts: [
      { label: 'Lot', value: lotCode },
      { label: 'Evidence', value: grade },
      { label: 'Open until', value: momentText(closesAt, timeZone) },
    ],
    action: { label: 'See it in the market', path: lotPath(lotCode) },
    closing: [],
  }),
});
