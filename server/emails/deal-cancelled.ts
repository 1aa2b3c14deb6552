import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, reasonField, usdText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  side: z.enum(['buyer', 'seller']),
  total: amountField,
  reason: reasonField,
});

export const dealCancelled = defineMail({
  audience: 'buyer and seller',
  trigger: 'not shipped in time, or the desk ruled for a refund',
  says: 'why, and that the buyer gets everything back',
  input,
  write: ({ dealCode, lotTitle, side, total, reason }) => ({
    subject: `Cancelled: ${lotTitle}`,
    heading: 'The deal is cancelled',
    paragraphs: [
      `The deal over “${lotTitle}” is cancelled. ${reason}`,
      side === 'buyer'
        ? `You get ${usdText(total)} back the way you paid; a mail follows when it has been sent.`
        : 'The buyer gets everything back. The lot is closed; you can draft a copy of it.',
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Refunded to the buyer', value: usdText(total) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: [],
  }),
});
