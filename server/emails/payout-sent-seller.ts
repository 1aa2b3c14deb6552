import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, instantField, momentText, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, net: amountField, paidAt: instantField });

export const payoutSentSeller = defineMail({
  audience: 'seller',
  trigger: 'the provider reported the payout as paid',
  says: 'the sum and when; the final sheet as PDF',
  input,
  write: ({ dealCode, lotTitle, net, paidAt }, { timeZone }) => ({
    subject: `Paid out: ${usdText(net)} for ${lotTitle}`,
    heading: 'Your payout has been paid',
    paragraphs: [`The payout for “${lotTitle}” has left for your bank account. The final sheet is attached.`],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Paid out', value: usdText(net) },
      { label: 'On', value: momentText(paidAt, timeZone) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['Keep the sheet with your books. Scruple computes no tax.'],
  }),
  attach: ({ dealCode }) => ({ kind: 'final-sheet', dealCode, audience: 'seller' }),
});
