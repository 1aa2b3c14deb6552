import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, total: amountField });

export const latePaymentRefunded = defineMail({
  audience: 'buyer',
  trigger: 'a payment succeeded after the purchase had lapsed',
  says: 'that it came too late and is sent back in full',
  input,
  write: ({ dealCode, lotTitle, total }) => ({
    subject: `Too late, sent back: ${usdText(total)} for ${lotTitle}`,
    heading: 'Your payment came after the deadline',
    paragraphs: [
      `The purchase of “${lotTitle}” had lapsed when your payment came in. The whole sum is sent back to you.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Sent back', value: usdText(total) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['If the lot is still open, you can buy it again.'],
  }),
});
