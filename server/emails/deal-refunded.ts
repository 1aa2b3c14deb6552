import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, total: amountField });

export const dealRefunded = defineMail({
  audience: 'buyer',
  trigger: 'the provider took the refund',
  says: 'the sum and that it goes back the way it came',
  input,
  write: ({ dealCode, lotTitle, total }) => ({
    subject: `Refunded: ${usdText(total)} for ${lotTitle}`,
    heading: 'Your refund has been sent',
    paragraphs: [
      `The whole sum for “${lotTitle}” goes back the way you paid it. Your bank may take some days to show it.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Refunded', value: usdText(total) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: [],
  }),
});
