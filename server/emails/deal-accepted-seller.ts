import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, usdText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  price: amountField,
  commission: amountField,
  shipping: amountField,
  net: amountField,
});

export const dealAcceptedSeller = defineMail({
  audience: 'seller',
  trigger: 'the buyer accepted',
  says: 'price, commission, parcel, net; the payout follows',
  input,
  write: ({ dealCode, lotTitle, price, commission, shipping, net }) => ({
    subject: `Accepted: ${usdText(net)} is on its way for ${lotTitle}`,
    heading: 'The buyer has accepted',
    paragraphs: [
      `“${lotTitle}” is settled. The sum below is being sent to your payout account; a mail follows when it is paid.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Price of the metal', value: usdText(price) },
      { label: 'Commission', value: `− ${usdText(commission)}` },
      { label: 'Insured parcel', value: usdText(shipping) },
      { label: 'Goes to you', value: usdText(net) },
    ],
    action: { label: 'See the final sheet', path: dealPath(dealCode) },
    closing: [],
  }),
});
