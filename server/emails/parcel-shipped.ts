import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { amountField, dealMail, dealPath, instantField, momentText, usdText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  carrier: z.string(),
  trackingNumber: z.string(),
  insured: amountField,
  arriveBy: instantField,
});

export const parcelShipped = defineMail({
  audience: 'buyer',
  trigger: 'the seller entered the parcel',
  says: 'carrier, tracking number, insured value, from when it may be reported as not arrived',
  input,
  appliesWhile: ['shipped'],
  write: ({ dealCode, lotTitle, carrier, trackingNumber, insured, arriveBy }, { timeZone }) => ({
    subject: `On its way: ${lotTitle}`,
    heading: 'The seller has shipped',
    paragraphs: [
      `“${lotTitle}” was handed to the carrier. Be there to sign, and weigh it on your own balance before you accept it.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Carrier', value: carrier },
      { label: 'Tracking number', value: trackingNumber },
      { label: 'Insured for', value: usdText(insured) },
    ],
    action: { label: 'Follow the parcel', path: dealPath(dealCode) },
    closing: [`If it has not come by ${momentText(arriveBy, timeZone)}, you can contest the deal.`],
  }),
});
