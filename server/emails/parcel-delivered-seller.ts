import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath, instantField, momentText } from './mail-text.ts';

const input = z.object({ ...dealMail, deliveredAt: instantField, inspectBy: instantField });

export const parcelDeliveredSeller = defineMail({
  audience: 'seller',
  trigger: 'the carrier delivered against signature, or the buyer confirmed the delivery',
  says: 'delivered when, until when the buyer inspects',
  input,
  appliesWhile: ['delivered'],
  write: ({ dealCode, lotTitle, deliveredAt, inspectBy }, { timeZone }) => ({
    subject: `Delivered: ${lotTitle}`,
    heading: 'Your parcel has been delivered',
    paragraphs: [`The buyer has “${lotTitle}” and weighs and inspects it now.`],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Delivered', value: momentText(deliveredAt, timeZone) },
      { label: 'The buyer inspects by', value: momentText(inspectBy, timeZone) },
    ],
    action: { label: 'Follow the deal', path: dealPath(dealCode) },
    closing: [],
  }),
});
