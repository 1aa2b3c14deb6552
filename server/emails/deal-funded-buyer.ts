import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, instantField, momentText, usdText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  price: amountField,
  shipping: amountField,
  total: amountField,
  shipBy: instantField,
});

export const dealFundedBuyer = defineMail({
  audience: 'buyer',
  trigger: 'the payment provider confirmed the payment',
  says: 'receipt: price, parcel, total held; until when the seller ships',
  input,
  write: ({ dealCode, lotTitle, price, shipping, total, shipBy }, { timeZone }) => ({
    subject: `Received and held: ${usdText(total)} for ${lotTitle}`,
    heading: 'Your payment is held in escrow',
    paragraphs: [
      `We hold your payment for “${lotTitle}”. It goes to the seller only after you have received the metal and accepted it.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Price of the metal', value: usdText(price) },
      { label: 'Insured parcel', value: usdText(shipping) },
      { label: 'Held in escrow', value: usdText(total) },
      { label: 'The seller ships by', value: momentText(shipBy, timeZone) },
    ],
    action: { label: 'Follow the deal', path: dealPath(dealCode) },
    closing: ['If it is not shipped by then, the deal is cancelled and you get everything back.'],
  }),
});
