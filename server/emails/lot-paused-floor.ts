import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { lotMail, lotPath, reasonField } from './mail-text.ts';

const input = z.object({ ...lotMail, reason: reasonField });

export const lotPausedFloor = defineMail({
  audience: 'seller',
  trigger: 'the metal rose past the floor of an outright lot',
  says: 'price and floor; that the seller prices it anew',
  input,
  write: ({ lotCode, lotTitle, reason }) => ({
    subject: `Paused at your floor: ${lotTitle}`,
    heading: 'Your lot is paused',
    paragraphs: [`“${lotTitle}” is off the register. ${reason}`, 'Change the price, then open it again.'],
    facts: [{ label: 'Lot', value: lotCode }],
    action: { label: 'See the lot', path: lotPath(lotCode) },
    closing: [],
  }),
});
