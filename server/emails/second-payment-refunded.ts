import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, total: amountField });

export const secondPaymentRefunded = defineMail({
  audience: 'buyer',
  trigger: 'a second payment succeeded for a deal that was paid before',
  says: 'that it is sent back in full and the deal goes on',
  input,
  write: ({ dealCode, lotTitle, total }) => ({
    subject: `Paid twice, sent back: ${usdText(total)} for ${lotTitle}`,
    heading: 'Your second payment is sent back',
    paragraphs: [
      `“${lotTitle}” had been paid for when another payment of yours came in. The second one is sent back to you in full.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Sent back', value: usdText(total) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['Your deal goes on as before; there is nothing that you need to do.'],
  }),
});
