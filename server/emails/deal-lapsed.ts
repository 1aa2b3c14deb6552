import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath } from './mail-text.ts';

const input = z.object({ ...dealMail, side: z.enum(['buyer', 'seller']) });

export const dealLapsed = defineMail({
  audience: 'buyer and seller',
  trigger: 'not paid by the funding deadline',
  says: 'that nothing was charged and the lot is open again',
  input,
  write: ({ dealCode, lotTitle, side }) => ({
    subject: `Lapsed: ${lotTitle}`,
    heading: 'The purchase has lapsed',
    paragraphs: [
      side === 'buyer'
        ? `“${lotTitle}” was not paid in time. Nothing is held; a payment that still comes in is sent back in full.`
        : `The buyer of “${lotTitle}” did not pay in time. Your lot is open again.`,
    ],
    facts: [{ label: 'Deal', value: dealCode }],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: [],
  }),
});
