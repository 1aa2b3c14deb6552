import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath, instantField, momentText, reasonField } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  side: z.enum(['buyer', 'seller']),
  reason: z.string(),
  note: reasonField,
  decideBy: instantField,
});

export const dealContested = defineMail({
  audience: 'buyer and seller',
  trigger: 'the buyer contested',
  says: 'what is contested, that the money stays held, by when the desk rules',
  input,
  write: ({ dealCode, lotTitle, side, reason, note, decideBy }, { timeZone }) => ({
    subject: `Contested: ${lotTitle}`,
    heading: side === 'buyer' ? 'Your objection is with the desk' : 'The buyer contests the deal',
    paragraphs: [
      `The deal over “${lotTitle}” is contested: the money stays held, and nothing is paid out or refunded until the desk has ruled.`,
      `In the buyer’s words: “${note}”`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Reason', value: reason },
      { label: 'The desk rules by', value: momentText(decideBy, timeZone) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['Keep the metal, its packing and your photographs as they are until then.'],
  }),
});
