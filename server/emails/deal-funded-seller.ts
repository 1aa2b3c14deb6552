import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, instantField, momentText, usdText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  total: amountField,
  shipBy: instantField,
  deliveryName: z.string(),
  deliveryPlace: z.string(),
});

export const dealFundedSeller = defineMail({
  audience: 'seller',
  trigger: 'the payment provider confirmed the payment',
  says: 'what is held, ship by when, insured for how much at least, what happens otherwise',
  input,
  appliesWhile: ['funded'],
  write: ({ dealCode, lotTitle, total, shipBy, deliveryName, deliveryPlace }, { timeZone }) => ({
    subject: `Ship by ${momentText(shipBy, timeZone)}: ${lotTitle}`,
    heading: 'The buyer has paid into escrow',
    paragraphs: [
      `“${lotTitle}” is paid for. Pack it, ship it insured and against signature, and enter the tracking number in the deal.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Held in escrow', value: usdText(total) },
      { label: 'Ship by', value: momentText(shipBy, timeZone) },
      { label: 'To', value: `${deliveryName}, ${deliveryPlace}` },
    ],
    action: { label: 'See the address and enter the parcel', path: dealPath(dealCode) },
    closing: [
      'If it is not shipped by then, the deal is cancelled and the buyer gets everything back.',
      'Until the buyer has it against signature, the risk is yours: insure it for the price at least.',
    ],
  }),
});
