import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath, instantField, momentText } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  deliveredAt: instantField,
  signedBy: z.string().nullable(),
  inspectBy: instantField,
});

export const parcelDeliveredBuyer = defineMail({
  audience: 'buyer',
  trigger: 'the carrier delivered against signature, or the buyer confirmed the delivery',
  says: 'inspect by when, what to record, how to accept or contest',
  input,
  appliesWhile: ['delivered'],
  write: ({ dealCode, lotTitle, deliveredAt, signedBy, inspectBy }, { timeZone }) => ({
    subject: `Inspect by ${momentText(inspectBy, timeZone)}: ${lotTitle}`,
    heading: 'Your parcel has been delivered',
    paragraphs: [
      `“${lotTitle}” has arrived. Weigh it, compare mark and mass with the sheet, record the mass, and accept or contest.`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Delivered', value: momentText(deliveredAt, timeZone) },
      { label: 'Signed by', value: signedBy ?? 'no signature; confirmed by you' },
      { label: 'Inspect by', value: momentText(inspectBy, timeZone) },
    ],
    action: { label: 'Record the mass', path: dealPath(dealCode) },
    closing: [
      'The money stays in escrow until you accept, or until the desk has ruled on what you contest. If you do neither in time, the desk can take up the deal and rule.',
    ],
  }),
});
