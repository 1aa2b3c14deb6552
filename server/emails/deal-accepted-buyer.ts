import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, total: amountField });

export const dealAcceptedBuyer = defineMail({
  audience: 'buyer',
  trigger: 'the buyer accepted',
  says: 'that the acceptance is recorded and what is released',
  input,
  write: ({ dealCode, lotTitle, total }) => ({
    subject: `You accepted ${lotTitle}`,
    heading: 'Your acceptance is recorded',
    paragraphs: [`You accepted “${lotTitle}”, and what was held for it is being released to the seller.`],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Released', value: usdText(total) },
    ],
    action: { label: 'See the final sheet', path: dealPath(dealCode) },
    closing: ['If this was not you, write to the desk at once.'],
  }),
});
