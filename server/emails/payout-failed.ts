import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, usdText } from './mail-text.ts';

const input = z.object({ ...dealMail, net: amountField, failureCode: z.string() });

export const payoutFailed = defineMail({
  audience: 'seller',
  trigger: 'the bank or the provider refused the payout',
  says: 'the sum, the reason as the provider names it, where to mend the payout account',
  input,
  write: ({ dealCode, lotTitle, net, failureCode }) => ({
    subject: `The payout for ${lotTitle} came back`,
    heading: 'Your payout could not be paid',
    paragraphs: [
      `The payout for “${lotTitle}” was refused. The money is still yours and waits in your account at the payment provider.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Sum', value: usdText(net) },
      { label: 'Reason given', value: failureCode },
    ],
    action: { label: 'Look at your payout account', path: '/account' },
    closing: [],
  }),
});
