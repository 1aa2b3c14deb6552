import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, instantField, momentText, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, total: amountField, paidAt: instantField });

export const payoutSentBuyer = defineMail({
  audience: 'buyer',
  trigger: 'the provider reported the payout as paid',
  says: 'that the deal is closed; the final sheet as PDF',
  input,
  write: ({ dealCode, lotTitle, total, paidAt }, { timeZone }) => ({
    subject: `Closed: ${lotTitle}`,
    heading: 'The deal is closed',
    paragraphs: [`The seller of “${lotTitle}” has been paid. Your final sheet is attached.`],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'You paid', value: usdText(total) },
      { label: 'Closed', value: momentText(paidAt, timeZone) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['Keep the sheet with your books. Scruple computes no tax.'],
  }),
  attach: ({ dealCode }) => ({ kind: 'final-sheet', dealCode, audience: 'buyer' }),
});
