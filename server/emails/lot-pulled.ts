import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { lotMail, lotPath, reasonField } from './mail-text.ts';

const input = z.object({ ...lotMail, reason: reasonField });

export const lotPulled = defineMail({
  audience: 'seller',
  trigger: 'the desk pulled an open lot',
  says: 'the reason',
  input,
  write: ({ lotCode, lotTitle, reason }) => ({
    subject: `Withdrawn by the desk: ${lotTitle}`,
    heading: 'The desk has withdrawn your lot',
    paragraphs: [`“${lotTitle}” is no longer in the market. The desk’s reason: “${reason}”`],
    facts: [{ label: 'Lot', value: lotCode }],
    action: { label: 'See the lot', path: lotPath(lotCode) },
    closing: [],
  }),
});
